import type { AlignedData } from 'uplot'
import type { Trace } from '@/shared/schemas'
import { formatDuration, formatVacuum, fromPa, type VacuumUnit } from '@/shared/units'

const inUnit = (values: readonly (number | null)[], unit: VacuumUnit): (number | null)[] =>
  values.map((value) => (value === null ? null : fromPa(value, unit)))

/** The trace as uPlot takes it: seconds, greatest, least. Every extreme is in one of the two; gaps stay null. */
export function traceData(trace: Trace | undefined, unit: VacuumUnit): AlignedData {
  const vacuum = trace?.channels.vacuum
  if (!vacuum) return [[], [], []]
  return [vacuum.at.map((ms) => ms / 1000), inUnit(vacuum.max, unit), inUnit(vacuum.min, unit)]
}

const extreme = (values: readonly (number | null)[], pick: (a: number, b: number) => number): number | null =>
  values.reduce<number | null>(
    (best, value) => (value === null ? best : best === null ? value : pick(best, value)),
    null,
  )

const count = (n: number, one: string, many: string): string => `${n} ${n === 1 ? one : many}`

/** What the trace shows, in a sentence: runs, flushes, the lowest and highest vacuum, gaps. */
export function traceFinding(trace: Trace, lengthSeconds: number, unit: VacuumUnit): string {
  const alone = trace.runs.filter((run) => run.trigger === 'leak').length
  const flushes = trace.flushes.length
  const vacuum = trace.channels.vacuum
  const parts = [
    `In ${formatDuration(lengthSeconds)} the pump ran ${count(trace.runs.length, 'time', 'times')}`,
    `${alone} of them by itself`,
  ]
  if (flushes > 0) parts.push(`${count(flushes, 'flush', 'flushes')}`)
  if (vacuum) {
    const low = extreme(vacuum.min, Math.min)
    const high = extreme(vacuum.max, Math.max)
    if (low !== null && high !== null)
      parts.push(`vacuum between ${formatVacuum(low, unit, 2)} and ${formatVacuum(high, unit, 2)}`)
    const gaps = vacuum.mean.filter((value) => value === null).length
    if (gaps > 0) parts.push(`${count(gaps, 'gap', 'gaps')} in what was heard`)
  }
  return `${parts.join(', ')}.`
}
