import type { FaultKind, FoldSettings, Instant, StatementValue } from './types'

/** Last value of each channel and when it came; `null` = none, or taken away by a gap or another logger. */
export interface Channels {
  vacuumPa: number | null
  vacuumAt: Instant | null
  pumpOn: boolean | null
  pumpAt: Instant | null
  airC: number | null
  airAt: Instant | null
  laggedAirC: [number | null, number | null]
  barometerPa: number | null
  barometerAt: Instant | null
  supplyV: number | null
  supplyAt: Instant | null
}

export interface OpenHold {
  startedAt: Instant
  /** False where it began in the dark (after a gap, at the first sample): its length is not a hold time. */
  startSeen: boolean
  cutOutPa: number | null
  flushes: number
  learnedCutOutPa: number | null
  learnedSettledPa: number | null
  learnedCutInPa: number | null
  /** Under this without a start the pump is off. */
  offLinePa: number
  setAside: boolean
  edgeUncertaintySeconds: number
  /** What the gas may take back while it warms after the stop (generous). */
  settlingPa: number
  /** No leg before this instant: the gas is settling after a stop or a flush. */
  settledAt: Instant
  /** First and last accepted vacuum, and the first past the settling (before any flush). */
  firstAt: Instant | null
  firstPa: number | null
  topAt: Instant | null
  topPa: number | null
  lastAt: Instant | null
  lastPa: number | null
}

/** A hold that a start has ended; what ended it is known when the run stops. */
export interface EndedHold extends OpenHold {
  endedAt: Instant
  endPa: number | null
}

export interface OpenRun {
  startedAt: Instant
  startSeen: boolean
  startPa: number | null
  /** Fall to the start beyond what the leak explains; null where the vacuum beside it is unknown. */
  fallPa: number | null
  /** The same without any margin for the leak. */
  bareFallPa: number | null
  /** Vacuum before that fall. */
  beforePa: number | null
  /** From far below the cut-in, after being off. */
  fromOff: boolean
  setAside: boolean
  /** Time between the samples beside the start. */
  startSpacingMs: number
  edgeUncertaintySeconds: number
  /** Lowest vacuum before it began to rise: what a flush that started the run left. */
  lowPa: number | null
  /** A fall after the vacuum had begun to rise: a flush during the run, not its cause. */
  fall: { at: Instant; fromPa: number; lowPa: number } | null
  fellMidRun: boolean
  /** Seen to rise from its start as a recharge of this pump does: then nothing was flushed at the start. */
  onCurve: boolean
  topPa: number | null
  topAt: Instant | null
  /** Last sample under the learned cut-in, and when the vacuum crossed it. */
  underAt: Instant | null
  underPa: number | null
  crossedAt: Instant | null
  /** Last time that the vacuum was seen to rise by something, and to where. */
  risingAt: Instant
  risingPa: number | null
  supplyV: number | null
}

export interface OpenBin {
  index: number
  count: number
  offsetSum: number
  vacuumSum: number
  airCount: number
  airSum: number
  lag0Sum: number
  lag1Sum: number
  barometerCount: number
  barometerSum: number
}

export interface OpenLeg {
  startedAt: Instant
  endedAt: Instant
  sinceFlushSeconds: number | null
  setAside: boolean
  widthSeconds: number
  offsetSeconds: number[]
  count: number[]
  vacuumPa: number[]
  airC: (number | null)[]
  lag0C: (number | null)[]
  lag1C: (number | null)[]
  barometerPa: (number | null)[]
  open: OpenBin | null
}

/** A fall that later samples must confirm. */
export interface PendingFall {
  fromAt: Instant
  fromPa: number
  at: Instant
  lowAt: Instant
  lowPa: number
  /** What the leak explains, Pa/s. */
  slopePaPerSecond: number
}

/** Vacuum-only loggers: the lowest sample before a rise, and the last one still level with it. */
export interface Turn {
  baseAt: Instant
  basePa: number
  turnAt: Instant
  turnPa: number
  /** Sample before the turning one: what a flush fell from. */
  beforeAt: Instant | null
  beforePa: number | null
}

export interface Rings {
  cutOutPa: number[]
  cutInPa: number[]
  settledPa: number[]
  rechargePaPerSecond: number[]
  /** Seconds of leak runs; of all runs where there is no vacuum channel. */
  runSeconds: number[]
  /**
   * Levels of recent starts from far below, of starts that looked too high for the switch, and lengths of
   * over-long runs: five alike replace the ring.
   */
  lowStartPa: number[]
  highStartPa: number[]
  longRunSeconds: number[]
  /** Starts without a visible fall seen through samples too far apart to be the switch's own level. */
  sparseStartPa: number[]
}

export interface FaultState {
  kind: FaultKind | null
  startedAt: Instant | null
  detail: string
  /** Vacuum that has not moved at all since. */
  samePa: number | null
  sameSince: Instant | null
  /** Runs in a row through which it did not move. */
  sameRuns: number
  /** Reading held off because nothing like it came before or after (yet). */
  zeroSince: Instant | null
  zeroLowPa: number
  zeroHighPa: number
}

export interface FoldState {
  deriverVersion: number
  /** Time of the last item, of the last sample, and the spacing before it. */
  at: Instant | null
  sampleAt: Instant | null
  spacingMs: number
  /** Last sample that came in the logger's rhythm rather than at an edge. */
  rhythmAt: Instant | null
  /** The logger was seen to record an edge when it happened: no run of its passes unseen between samples. */
  recordsEdges: boolean
  settings: FoldSettings
  fitting: { loggerId: string; at: Instant; intervalSeconds: number; pump: boolean; vacuum: boolean } | null
  statement: { value: StatementValue; since: Instant } | null
  channels: Channels
  sigmaPa: number
  stepPa: number
  /** Usual fall by the leak, Pa/s. */
  slopePaPerSecond: number
  lastFlushAt: Instant | null
  lastGap: { from: Instant; to: Instant } | null
  lowSince: Instant | null
  offSince: Instant | null
  hold: OpenHold | null
  ended: EndedHold | null
  run: OpenRun | null
  leg: OpenLeg | null
  fall: PendingFall | null
  /** The last half minute of accepted vacuum, thinned: time and Pa in turn. */
  recent: number[]
  turn: Turn | null
  rings: Rings
  fault: FaultState
  checkpoint: { block: number | null; at: Instant | null; due: boolean }
}
