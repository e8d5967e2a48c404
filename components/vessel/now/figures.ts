import { ago, clock, offsetAt, type ZoneOffset } from '@/components/time'
import type { Outlook, Summary, System } from '@/shared/schemas'
import { formatDuration, formatVacuum, UNKNOWN, vacuumFigure, type VacuumUnit } from '@/shared/units'

export type FigureLine = { name: string; value: string; note: string }

function nextRun(outlook: Outlook | null, offsets: readonly ZoneOffset[]): FigureLine {
  const first = outlook?.firstRun ?? null
  const at = (instant: string) => clock(instant, offsetAt(offsets, Date.parse(instant)))
  if (first === null) return { name: 'Next run in the night', value: 'none expected', note: '' }
  const span = first.latest
    ? `${at(first.earliest)} to ${at(first.latest)}`
    : `not before ${at(first.earliest)}`
  return first.at === null
    ? { name: 'First run in the night', value: span, note: 'it depends on the last flush' }
    : { name: 'Next run in the night', value: `about ${at(first.at)}`, note: `${span}, if nobody flushes` }
}

/** The figures of this moment, each with what it is measured against. */
export function nowFigures(
  summary: Summary,
  outlook: Outlook | null,
  system: System,
  unit: VacuumUnit,
  offsets: readonly ZoneOffset[],
  nowMs: number,
): FigureLine[] {
  const { current, recharge } = summary
  const set = (pa: number | null) => (pa === null ? 'none set' : `set to ${vacuumFigure(pa, unit)}`)
  const inUnit = (paPerSecond: number) => `${vacuumFigure(paPerSecond, unit, 3)} ${unit}/s`
  const lines: FigureLine[] = [
    {
      name: 'Vacuum',
      value: formatVacuum(current?.vacuumPa, unit, unit === 'mbar' ? 0 : 2),
      note: current ? ago(current.at, nowMs) : 'nothing heard yet',
    },
    {
      name: 'Pump',
      value: current?.pumpOn === true ? 'running' : current?.pumpOn === false ? 'stopped' : UNKNOWN,
      note: '',
    },
    {
      name: 'Holds so far',
      value: formatDuration(current?.holdSoFarSeconds),
      note: summary.holdTime ? `of about ${formatDuration(summary.holdTime.seconds)}` : '',
    },
  ]
  if (outlook !== null) lines.push(nextRun(outlook, offsets))
  lines.push(
    { name: 'Stops at', value: formatVacuum(summary.cutOutPa, unit), note: set(system.settings.cutOutPa) },
    {
      name: 'Settles to',
      value: formatVacuum(summary.settledPa, unit),
      note: 'as the gas warms after a run',
    },
    { name: 'Starts at', value: formatVacuum(summary.cutInPa, unit), note: set(system.settings.cutInPa) },
    {
      name: 'Recharge',
      value: recharge ? inUnit(recharge.paPerSecond) : UNKNOWN,
      note: recharge?.usualPaPerSecond ? `usually ${inUnit(recharge.usualPaPerSecond)}` : '',
    },
  )
  return lines
}
