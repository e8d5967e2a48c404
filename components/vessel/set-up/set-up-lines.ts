import { ago, dayOf } from '@/components/time'
import type { System, SystemKind, Vessel } from '@/shared/schemas'
import { formatDuration, formatVacuum, formatVolume, UNKNOWN, type UnitChoice } from '@/shared/units'

export type SetUpGroup = { title: string; lines: { name: string; value: string }[] }

const KIND_WORDS: Record<SystemKind, string> = {
  'pass-through': 'pass-through: waste goes through to the pump',
  collecting: 'collecting: waste stays in the tank under vacuum',
  unit: 'pump and tank in one unit',
  'two-pumps': 'two pumps or tanks',
  'on-demand': 'on demand: no standing vacuum',
}

function figures(system: System, units: UnitChoice, volumeM3: number): SetUpGroup {
  const { settings } = system
  return {
    title: 'Figures',
    lines: [
      { name: 'Kind', value: KIND_WORDS[settings.kind] },
      { name: 'Pump stops at', value: formatVacuum(settings.cutOutPa, units.vacuum) },
      { name: 'Pump starts at', value: formatVacuum(settings.cutInPa, units.vacuum) },
      { name: 'Gas volume', value: volumeM3 > 0 ? formatVolume(volumeM3, units.volume) : UNKNOWN },
      { name: 'Limit', value: formatDuration(settings.limitSeconds) },
      { name: 'Aim', value: formatDuration(settings.aimSeconds) },
      { name: 'Unheard after', value: formatDuration(settings.silenceSeconds) },
      { name: 'Pump current', value: settings.pumpAmps === null ? UNKNOWN : `${settings.pumpAmps} A` },
      {
        name: 'Low supply under',
        value: settings.lowSupplyV === null ? UNKNOWN : `${settings.lowSupplyV} V`,
      },
    ],
  }
}

function logger(vessel: Vessel, system: System, nowMs: number): SetUpGroup {
  const fitted = system.logger
  if (fitted === null) return { title: 'Logger', lines: [{ name: 'Fitted', value: 'none' }] }
  const clock = fitted.clockOffsetSeconds
  return {
    title: 'Logger',
    lines: [
      { name: 'Serial', value: fitted.serial },
      { name: 'Fitted', value: dayOf(fitted.fittedAt, vessel.utcOffsetSeconds, nowMs) },
      { name: 'Sends every', value: formatDuration(fitted.intervalSeconds) },
      { name: 'Measures', value: fitted.channels.join(', ') },
      { name: 'Heard', value: fitted.lastHeardAt ? ago(fitted.lastHeardAt, nowMs) : 'not yet' },
      {
        name: 'Clock',
        value: clock === null ? UNKNOWN : `${clock < 0 ? '−' : '+'}${Math.abs(clock).toFixed(0)} s`,
      },
    ],
  }
}

function people(vessel: Vessel): SetUpGroup {
  const levels = { figures: 'leak figures', full: 'the full record' }
  return {
    title: 'Boat and people',
    lines: [
      {
        name: 'Quiet hours',
        value: `${vessel.quietHours.start} to ${vessel.quietHours.end}, ${vessel.timeZone}`,
      },
      {
        name: 'Owner',
        value:
          vessel.owner?.name ?? (vessel.keptBy ? `kept by ${vessel.keptBy.name} until one accepts` : UNKNOWN),
      },
      ...vessel.access.map((access) => ({ name: access.shopName, value: `may see ${levels[access.level]}` })),
    ],
  }
}

/** The set-up as groups of lines, for reading. `volumeM3` is the sum of the parts. */
export const setUpLines = (
  vessel: Vessel,
  system: System,
  units: UnitChoice,
  volumeM3: number,
  nowMs: number,
): SetUpGroup[] => [figures(system, units, volumeM3), logger(vessel, system, nowMs), people(vessel)]
