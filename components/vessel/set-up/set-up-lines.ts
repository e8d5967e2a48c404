import { ago, dayOf } from '@/components/time'
import { KINDS } from '@/components/vessel/set-up/figure-values'
import type { Settings, Summary, System, Vessel } from '@/shared/schemas'
import { formatDuration, formatVacuum, UNKNOWN, type UnitChoice } from '@/shared/units'

export type SetUpLine = { name: string; value: string }

/** A figure that was set, with the one the record shows beside it; without, the record's alone. */
function besideLearned(set: number | null, learned: number | null | undefined, units: UnitChoice): string {
  if (set === null)
    return learned == null ? 'not learned yet' : `${formatVacuum(learned, units.vacuum)}, learned`
  const said = formatVacuum(set, units.vacuum)
  return learned == null ? said : `${said}; the record shows ${formatVacuum(learned, units.vacuum)}`
}

/** The figures of a system, for reading. */
export function figureLines(
  settings: Settings,
  summary: Pick<Summary, 'cutOutPa' | 'cutInPa'> | undefined,
  units: UnitChoice,
): SetUpLine[] {
  const kind = KINDS[settings.kind]
  return [
    { name: 'Kind', value: `${kind.word}. ${kind.means}` },
    { name: 'Pump stops at', value: besideLearned(settings.cutOutPa, summary?.cutOutPa, units) },
    { name: 'Pump starts at', value: besideLearned(settings.cutInPa, summary?.cutInPa, units) },
    { name: 'Limit', value: formatDuration(settings.limitSeconds) },
    { name: 'Aim', value: formatDuration(settings.aimSeconds) },
    { name: 'Unheard after', value: formatDuration(settings.silenceSeconds) },
    { name: 'Pump current', value: settings.pumpAmps === null ? UNKNOWN : `${settings.pumpAmps} A` },
    {
      name: 'Low supply under',
      value: settings.lowSupplyV === null ? UNKNOWN : `${settings.lowSupplyV} V`,
    },
  ]
}

/** The logger that is fitted now. */
export function loggerLines(vessel: Vessel, system: System, nowMs: number): SetUpLine[] {
  const fitted = system.logger
  if (fitted === null) return [{ name: 'Fitted', value: 'none' }]
  const clock = fitted.clockOffsetSeconds
  return [
    { name: 'Serial', value: fitted.serial },
    { name: 'Fitted', value: dayOf(fitted.fittedAt, vessel.utcOffsetSeconds, nowMs) },
    { name: 'Sends every', value: formatDuration(fitted.intervalSeconds) },
    { name: 'Measures', value: fitted.channels.join(', ') },
    { name: 'Heard', value: fitted.lastHeardAt ? ago(fitted.lastHeardAt, nowMs) : 'not yet' },
    {
      name: 'Clock',
      value: clock === null ? UNKNOWN : `${clock < 0 ? '−' : '+'}${Math.abs(clock).toFixed(0)} s`,
    },
  ]
}

/** The boat, its nights, and who is about it. */
export function boatLines(vessel: Vessel): SetUpLine[] {
  const levels = { figures: 'leak figures', full: 'the full record' }
  return [
    { name: 'Name', value: vessel.name },
    { name: 'Place', value: [vessel.berth, vessel.harbour].filter(Boolean).join(', ') || UNKNOWN },
    { name: 'Quiet hours', value: `${vessel.quietHours.start} to ${vessel.quietHours.end}` },
    { name: 'Time zone', value: vessel.timeZone.replaceAll('_', ' ') },
    { name: 'Altitude', value: `${Math.round(vessel.altitudeM)} m` },
    {
      name: 'Owner',
      value:
        vessel.owner?.name ?? (vessel.keptBy ? `kept by ${vessel.keptBy.name} until one accepts` : UNKNOWN),
    },
    ...vessel.access.map((access) => ({ name: access.shopName, value: `may see ${levels[access.level]}` })),
  ]
}
