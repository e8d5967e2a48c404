/**
 * The words of the fold: what goes in (samples as stored and dated facts), what comes out (rows that are
 * inserted once and never updated). Times are epoch milliseconds, pressures Pa, vacuum positive below ambient.
 */

/** Epoch milliseconds, UTC. */
export type Instant = number

/** One timestamp of one logger, as stored (already rounded). `null` = that channel was not measured. */
export interface Sample {
  at: Instant
  vacuumPa: number | null
  pumpOn: boolean | null
  airC: number | null
  barometerPa: number | null
  supplyV: number | null
}

export type SystemKind = 'pass-through' | 'collecting' | 'unit' | 'two-pumps' | 'on-demand'

/** The set-up's figures in force from a moment on; `null` = not known, the learned value or the default serves. */
export interface FoldSettings {
  kind: SystemKind
  cutOutPa: number | null
  cutInPa: number | null
}

export type StatementValue = 'off' | 'laid-up' | 'worked-on'

/** A dated fact; facts sort before samples of the same instant, among themselves in the order of `kind` below. */
export type Fact =
  | { kind: 'settings'; at: Instant; settings: FoldSettings }
  | {
      kind: 'fitting'
      at: Instant
      loggerId: string
      intervalSeconds: number
      channels: { pump: boolean; vacuum: boolean }
    }
  | { kind: 'removal'; at: Instant; loggerId: string }
  /** What people said; `null` takes back what was said before. An `until` arrives as a later `null`. */
  | { kind: 'statement'; at: Instant; value: StatementValue | null }

export type FoldItem = { type: 'fact'; fact: Fact } | { type: 'sample'; sample: Sample }

export type Trigger = 'leak' | 'flush' | 'startup' | 'unknown'
export type Ending = 'leak' | 'flush' | 'unknown' | 'interrupted'

/** The pump was on. */
export interface RunRow {
  startedAt: Instant
  stoppedAt: Instant
  trigger: Trigger
  vacuumAtStartPa: number | null
  vacuumAtStopPa: number | null
  /** Rise over the band between learned cut-in and cut-out by the time it took; null where it cannot be told. */
  rechargePaPerSecond: number | null
  supplyV: number | null
  /** How far either edge may be off: the spacing of the samples beside it. */
  edgeUncertaintySeconds: number
  /** Ended by missing data rather than by a stop that was seen. */
  interrupted: boolean
  knownAt: Instant
}

/** The pump was off, from a stop to the next start. */
export interface HoldRow {
  startedAt: Instant
  endedAt: Instant
  ending: Ending
  /** Flushes within it that did not start the pump. */
  flushes: number
  /** Peak at the stop that began it; the settled top after it; the vacuum at its end. */
  cutOutPa: number | null
  settledPa: number | null
  endPa: number | null
  /** The rings' medians at its start (set-up's figures until there are five). */
  learnedCutOutPa: number | null
  learnedSettledPa: number | null
  learnedCutInPa: number | null
  /** True while people worked on the system or it was laid up: left out of statistics. */
  setAside: boolean
  edgeUncertaintySeconds: number
  knownAt: Instant
}

/** Parallel arrays, one entry a bin: means over the samples of the bin. At most 120 bins. */
export interface LegBins {
  widthSeconds: number
  /** Mean time of the bin's samples, seconds after the leg's start. */
  offsetSeconds: number[]
  count: number[]
  vacuumPa: number[]
  /** Air as measured, and air passed through first-order lags of LAG_SECONDS; null where unknown. */
  airC: (number | null)[]
  laggedAirC: [(number | null)[], (number | null)[]]
  barometerPa: (number | null)[]
}

/** Time constants of the two lagged copies of the air temperature kept beside it. */
export const LAG_SECONDS = [1_800, 7_200] as const

/** A part of a hold without a flush in it, settling dropped: what a leak rate is measured on. */
export interface LegRow {
  holdStartedAt: Instant
  startedAt: Instant
  endedAt: Instant
  /** How long ago, at the leg's start, the last flush was; null = none known. */
  sinceFlushSeconds: number | null
  bins: LegBins
  /** The leg's own compensated Theil–Sen rate with its 95 % interval; null under 5 min or 8 bins. */
  rate: { paPerHour: number; low: number; high: number; compensated: boolean } | null
  setAside: boolean
  knownAt: Instant
}

export interface FlushRow {
  at: Instant
  dropPa: number
  startedPump: boolean
  knownAt: Instant
}

export type FaultKind = 'stuck' | 'off-scale' | 'jump' | 'zero-drift' | 'swapped-sign'

export interface FaultRow {
  kind: FaultKind
  startedAt: Instant
  endedAt: Instant
  detail: string
  knownAt: Instant
}

export type Row =
  | { table: 'run'; row: RunRow }
  | { table: 'hold'; row: HoldRow }
  | { table: 'leg'; row: LegRow }
  | { table: 'flush'; row: FlushRow }
  | { table: 'fault'; row: FaultRow }

/** What is open at the head of the fold: read from the state, never stored as a row. */
export interface OpenRows {
  run: Omit<RunRow, 'stoppedAt' | 'knownAt'> | null
  hold: Omit<HoldRow, 'endedAt' | 'ending' | 'knownAt'> | null
  leg: Omit<LegRow, 'endedAt' | 'knownAt'> | null
}
