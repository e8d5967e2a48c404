import type { ScatterPoint } from '@/components/charts/scatter-plot'
import type { Hold } from '@/shared/schemas'
import { formatDuration } from '@/shared/units'

export type Limits = { limitSeconds: number; aimSeconds: number }

/** Ended by the pump itself, by a flush, or by something that says nothing of the hold. */
const counts = (hold: Hold): boolean =>
  hold.ending === 'leak' || hold.ending === 'flush' || hold.ending === 'unknown'

/** Holds as points: filled where the pump ran by itself, hollow where a flush cut the hold short. */
export function holdPoints(holds: readonly Hold[], { limitSeconds, aimSeconds }: Limits): ScatterPoint[] {
  return holds.filter(counts).map((hold) => {
    const seconds = Math.max(1, hold.durationSeconds)
    const byItself = hold.ending === 'leak'
    const tone = seconds < limitSeconds ? 'attention' : seconds < aimSeconds ? 'buff-ink' : 'sound'
    return {
      atMs: Date.parse(hold.startedAt),
      value: seconds,
      shape: byItself ? 'full' : 'open',
      tone: byItself ? tone : 'ink-2',
    }
  })
}

function median(values: readonly number[]): number | null {
  const sorted = [...values].sort((a, b) => a - b)
  const middle = sorted[Math.floor((sorted.length - 1) / 2)]
  const other = sorted[Math.ceil((sorted.length - 1) / 2)]
  return middle === undefined || other === undefined ? null : (middle + other) / 2
}

/** The holds in a sentence: how many ended by themselves, their middle one, and how many under the limit. */
export function holdsFinding(holds: readonly Hold[], days: number, { limitSeconds }: Limits): string {
  const own = holds.filter((hold) => hold.ending === 'leak').map((hold) => hold.durationSeconds)
  const cut = holds.filter((hold) => hold.ending === 'flush').length
  const middle = median(own)
  if (middle === null) {
    return cut === 0
      ? `No hold ended in these ${days} days.`
      : `In ${days} days a flush ended each of the ${cut} holds; the pump never ran by itself.`
  }
  const under = own.filter((seconds) => seconds < limitSeconds).length
  return `In ${days} days the pump ended ${own.length} ${own.length === 1 ? 'hold' : 'holds'} by itself, half of them within ${formatDuration(
    middle,
  )}; ${under} stayed under the limit of ${formatDuration(limitSeconds)}. A flush cut ${cut} short.`
}

/** Ticks of the hold axis that are not near the limit or the aim, which always have theirs. */
const TICKS = [10, 60, 600, 3600, 10_800, 28_800, 86_400, 172_800, 864_000]
export function holdAxis(points: readonly ScatterPoint[], { limitSeconds, aimSeconds }: Limits) {
  const values = [limitSeconds / 3, aimSeconds * 2, ...points.map((point) => point.value)]
  const low = values.reduce((a, b) => Math.min(a, b)) * 0.8
  const high = values.reduce((a, b) => Math.max(a, b)) * 1.25
  const own = [limitSeconds, aimSeconds]
  const clear = (tick: number) => own.every((mine) => Math.abs(Math.log(tick / mine)) > 0.4)
  const ticks = [...own, ...TICKS.filter((tick) => tick >= low && tick <= high && clear(tick))]
  return { low, high, ticks: ticks.sort((a, b) => a - b) }
}

/** A tick in words, limit and aim by name: "limit 3 h". */
export function holdTickLabel(seconds: number, { limitSeconds, aimSeconds }: Limits): string {
  const length = seconds === 60 ? '1 min' : formatDuration(seconds)
  if (seconds === limitSeconds) return `limit ${length}`
  return seconds === aimSeconds ? `aim ${length}` : length
}
