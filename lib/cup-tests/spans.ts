const HOUR_MS = 3_600_000
/** The leak of an older evening is another leak. */
const BEFORE_MS = 6 * HOUR_MS
/** A cup lasts the night. */
export const WET_MS = 12 * HOUR_MS
const AFTER_MS = 6 * HOUR_MS
/** A flush wets a seal for a while: where enough was heard since the last one, that alone is the leak before. */
const SHOWN_MS = HOUR_MS / 2

/** Epoch milliseconds, from and to. */
export type Span = readonly [number, number]

export interface CupSpans {
  before: Span
  wet: Span
  /** Null before the flush, and where the next bowl was wetted first. */
  after: Span | null
  flushedAt: number | null
  /** The water is gone, another bowl was wetted, or the night is over: waiting tells nothing more. */
  over: boolean
}

/**
 * Which stretches of the record speak of a cup test. Times are epoch milliseconds.
 * @param flushes oldest first, as known at `at`
 * @param previousWaterAt the cup test before it, whose water was in until a flush; null = none
 * @param nextWaterAt the one after it; null = none
 * @example spansOf({ waterAt, at, flushes: [], previousWaterAt: null, nextWaterAt: null }).wet // [waterAt, at]
 */
export function spansOf(known: {
  waterAt: number
  at: number
  flushes: readonly number[]
  previousWaterAt: number | null
  nextWaterAt: number | null
}): CupSpans {
  const { waterAt, at, flushes, previousWaterAt, nextWaterAt } = known
  const dryAgain =
    previousWaterAt === null
      ? -Infinity
      : (flushes.find((flush) => flush > previousWaterAt && flush < waterAt) ?? previousWaterAt)
  const lastFlush = flushes.findLast((each) => each <= waterAt - SHOWN_MS) ?? -Infinity
  const disturbed = flushes.some((each) => each > waterAt - SHOWN_MS && each < waterAt)
  const next = nextWaterAt ?? Infinity
  const flush = flushes.find((each) => each > waterAt && each <= at)
  const flushedAt = flush !== undefined && flush < next ? flush : null
  const wetTo = Math.min(flushedAt ?? Infinity, next, waterAt + WET_MS, at)
  return {
    before: [Math.max(waterAt - BEFORE_MS, dryAgain, disturbed ? -Infinity : lastFlush), waterAt],
    wet: [waterAt, wetTo],
    after: flushedAt === null ? null : [flushedAt, Math.min(flushedAt + AFTER_MS, next, at)],
    flushedAt,
    over: flushedAt !== null || next <= at || waterAt + WET_MS <= at,
  }
}
