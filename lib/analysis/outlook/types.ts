import type { FlushRow, HoldRow, Instant, OpenRows, RunRow } from '../fold/types'
import type { AboardWord, CurrentReading } from '../figures/types'
import type { LeakModel } from '../fit/types'

/** The boat's offset from UTC from an instant on (from the database's zone data), ascending, first at or before all rows. */
export interface OffsetSpan {
  from: Instant
  seconds: number
}

/** Quiet hours of one night as instants, and when the last flush is expected if somebody flushes last thing. */
export interface Night {
  from: Instant
  to: Instant
  bedtime: Instant
}

/** A point of the air and barometer of the last 24 to 48 h, ascending, a quarter to an hour apart. */
export interface AirPoint {
  at: Instant
  airC: number | null
  barometerPa: number | null
}

export interface OutlookInput {
  at: Instant
  night: Night
  offsets: readonly OffsetSpan[]
  /** Rows of the last 7 to 14 days known at `at`. */
  runs: readonly RunRow[]
  holds: readonly HoldRow[]
  flushes: readonly FlushRow[]
  open: OpenRows
  current: CurrentReading | null
  /** `figuresOf(…).model`; null while learning. */
  model: LeakModel | null
  air: readonly AirPoint[]
  /** Who is aboard, by the owner's word or the calendar; `unknown` = judged by flushes after 17:00. */
  said: AboardWord
  lastHeardAt: Instant | null
  /** Does the logger tell flushes (a vacuum channel)? */
  seesFlushes: boolean
}

export interface RunExpected {
  at: Instant | null
  earliest: Instant
  latest: Instant
}

export interface Outlook {
  at: Instant
  night: Night & { hours: number }
  /** Of at least one unprompted run in quiet hours, flushes as on the last nights; null while learning. */
  chance: number | null
  /** The same with a full recharge at bedtime. */
  chanceIfFlushedLast: number | null
  expectedRuns: number | null
  /** Expected unprompted runs if flushed last thing. */
  expectedRunsIfFlushedLast: number | null
  /**
   * First unprompted run at or after both `at` and the start of quiet hours. With the phase known `at` assumes
   * that nobody flushes and may lie after the night; with the phase open a span (5 to 95 %), null under 5 %.
   */
  firstRun: RunExpected | null
  /** The very next run from now if nobody flushes, whatever the hour; null while learning, or with none in two days. With the pump on, the one after this. */
  nextRun: RunExpected | null
  basis: 'phase-known' | 'phase-open' | 'learning'
  aboard: AboardWord
  /** Hold time the chances rest on, and when what they rest on was last heard. */
  holdSeconds: number | null
  heardAt: Instant | null
}

export interface WarningSettings {
  /** Chance over which a warning is due (default 0.5). */
  threshold: number
  /** False on systems that are being worked on, laid up or off. */
  expected: boolean
  /** What was said last: when, and how many runs it told; null = nothing yet. */
  lastWarning: { at: Instant; expectedRuns: number } | null
  /** Hour of the boat's day until which a first flush after "away" may still send (23:00), as an instant. */
  latestAt: Instant
}

export type WarningReason =
  | 'likely-even-if-flushed-last'
  | 'grown-by-half'
  | 'seven-days-since'
  | 'learning'
  | 'stale-data'
  | 'nobody-aboard'
  | 'flush-last-thing'
  | 'quiet-night'
  | 'already-said'
  | 'not-expected'
  | 'too-late'

export interface WarningDecision {
  warn: boolean
  reason: WarningReason
}

export interface NightInput {
  night: Pick<Night, 'from' | 'to'>
  runs: readonly RunRow[]
  holds: readonly HoldRow[]
  /** Whether a run was foretold (a warning sent, or the chance given over one half). */
  foretold: boolean
  /** Newest instant heard of when the night is scored. */
  heardUntil: Instant
}

export type NightOutcome = 'hit' | 'false' | 'missed' | 'quiet' | 'unknown'

export interface NightScore {
  outcome: NightOutcome
  /** Unprompted runs in quiet hours; null when the night was not heard. */
  runs: number | null
  firstRunAt: Instant | null
}
