import { STRIP_MINUTES } from '@/components/charts/scales'
import { quarterAfter } from '@/shared/quarter'
import type { Night, Outlook, Summary } from '@/shared/schemas'

/** A run is likely from this chance on; the same figure from which a warning is sent unless set otherwise. */
export const LIKELY = 0.5
/** Under this chance a night is simply quiet; between, it is only probably so. */
export const SURELY_QUIET = 0.2

/** The hold time as a plain figure; null where it is not known, or only as a bound. */
const holdMsOf = (summary: Summary | null): number | null =>
  summary?.holdTime && summary.holdTime.bound === null ? summary.holdTime.seconds * 1000 : null

/** While people are up, the night is told as it goes when somebody flushes last thing: the least that is to come. */
const isOpen = (outlook: Outlook): boolean => outlook.firstRun !== null && outlook.firstRun.at === null

/**
 * Expected runs as a number to say, at least one where a run is likely: those after a flush last thing while people
 * are up (as the message says), else as foretold.
 */
export function runsToSay(outlook: Outlook, summary: Summary | null): number {
  const holdMs = holdMsOf(summary)
  const runs =
    isOpen(outlook) && holdMs !== null && holdMs > 0
      ? Math.floor((Date.parse(outlook.night.to) - Date.parse(outlook.bedtime)) / holdMs)
      : Math.round(outlook.expectedRuns ?? 1)
  return Math.max(1, runs)
}

/**
 * The moment to name for the first run: the likeliest when the phase is known, else one hold time after a flush last
 * thing, else the end of its span.
 */
export function firstRunInstant(outlook: Outlook, summary: Summary | null): string | null {
  const first = outlook.firstRun
  if (first === null) return null
  const holdMs = holdMsOf(summary)
  if (!isOpen(outlook) || holdMs === null) return first.at ?? first.latest ?? first.earliest
  return new Date(Date.parse(outlook.bedtime) + holdMs).toISOString()
}

/** The same, to be said: while people are up no minute can be named, so it is the quarter of an hour after it. */
export function firstRunToSay(outlook: Outlook, summary: Summary | null): string | null {
  const instant = firstRunInstant(outlook, summary)
  if (instant === null || !isOpen(outlook)) return instant
  return new Date(quarterAfter(Date.parse(instant))).toISOString()
}

/** Minutes after 18:00 of the boat's clock, counted from the night's own start so that no zone is asked. */
export const minuteOf = (instant: string, outlook: Outlook, quiet: readonly [number, number]): number =>
  quiet[0] + (Date.parse(instant) - Date.parse(outlook.night.from)) / 60_000

/**
 * Where to draw the runs that are expected tonight: the first, then one every hold time until the quiet hours
 * end, as many as are expected. Nothing when a run is not likely.
 */
export function expectedMinutes(
  outlook: Outlook | null,
  summary: Summary | null,
  quiet: readonly [number, number],
): number[] {
  if (outlook === null || (outlook.chanceIfFlushedLast ?? 0) < LIKELY) return []
  const first = firstRunInstant(outlook, summary)
  if (first === null) return []
  const start = minuteOf(first, outlook, quiet)
  const stepMinutes = (summary?.holdTime?.seconds ?? Infinity) / 60
  const count = Math.min(200, runsToSay(outlook, summary))
  return Array.from({ length: count }, (_, index) => start + (index === 0 ? 0 : index * stepMinutes)).filter(
    (minute) => minute < quiet[1] && minute <= STRIP_MINUTES,
  )
}

/**
 * Tonight's own strip out of the listed nights. Before six in the evening the list still ends with the night
 * before; then tonight is drawn empty with the same quiet hours. Null when no night is listed.
 */
export function tonightOf(
  nights: readonly Night[],
  outlook: Outlook | null,
  offsetSeconds: number,
): Night | null {
  const last = nights[nights.length - 1]
  if (last === undefined || outlook === null) return last ?? null
  const sixOClockMs = Date.parse(outlook.night.from) - last.quiet[0] * 60_000 + offsetSeconds * 1000
  const date = new Date(sixOClockMs).toISOString().slice(0, 10)
  return last.date === date ? last : { date, quiet: last.quiet, runs: [], flushes: [], more: 0 }
}
