import type {
  FlushRow,
  HoldRow,
  Instant,
  LegRow,
  OpenRows,
  RunRow,
  StatementValue,
  SystemKind,
} from '../fold/types'
import type { LeakModel } from '../fit/types'

/** What a caller loads: rows known at `at`, newest first or oldest first as it likes (they are sorted here). */
export interface RecordRows {
  /** Runs, holds and flushes of the last `RECORD_DAYS` days. */
  runs: readonly RunRow[]
  holds: readonly HoldRow[]
  flushes: readonly FlushRow[]
  /** The newest `LEG_LIMIT` legs of the last `LEG_DAYS` days. */
  legs: readonly LegRow[]
}
export const RECORD_DAYS = 14
export const LEG_DAYS = 10
export const LEG_LIMIT = 96

/** The last value of each channel in the state of the fold; a channel never heard is null. */
export interface CurrentReading {
  at: Instant
  vacuumPa: number | null
  pumpOn: boolean | null
  airC: number | null
  barometerPa: number | null
  supplyV: number | null
}

/** What the rings in the state of the fold teach; null = nothing yet. Made by `figuresInput`. */
export interface LearnedFigures {
  cutOutPa: number | null
  settledPa: number | null
  cutInPa: number | null
  rechargePaPerSecond: number | null
  /** How many readings of the switch stand behind each point. */
  readings: { cutOut: number; cutIn: number }
  /** Step of the gauge as its readings show it, Pa; 0 = not seen. */
  stepPa: number
}

export interface FiguresSettings {
  kind: SystemKind
  /** The installer's figures; null = not known. */
  cutOutPa: number | null
  cutInPa: number | null
  limitSeconds: number
  aimSeconds: number
  silenceSeconds: number
  pumpAmps: number | null
  altitudeM: number
  /** Of the logger now fitted; with no logger both false. */
  channels: { pump: boolean; vacuum: boolean }
  intervalSeconds: number | null
}

export type AboardWord = 'aboard' | 'away' | 'unknown'

export interface FiguresInput {
  at: Instant
  rows: RecordRows
  open: OpenRows
  current: CurrentReading | null
  learned: LearnedFigures
  settings: FiguresSettings
  /** What the state of the fold shows besides rows (`conditionOf`). */
  condition: {
    /** Vacuum far under the cut-in without a start since then. */
    offSince: Instant | null
    /** From when the run in progress was running on. */
    runningOnSince: Instant | null
  }
  /** What people say of the system, in force at `at`. */
  statement: { value: StatementValue; since: Instant } | null
  /** Newest receipt of anything from its loggers, or newest sample where that is later; null = never heard. */
  lastHeardAt: Instant | null
}

export const SYSTEM_STATES = [
  'unheard',
  'laid-up',
  'worked-on',
  'running-on',
  'off',
  'learning',
  'short-cycling',
  'leaking',
  'weeping',
  'tight',
] as const
export type SystemState = (typeof SYSTEM_STATES)[number]

export interface LeakRateFigure {
  /** Mean rate over the switch's band at steady 20 °C and the place's standard pressure; > 0 loses vacuum. */
  paPerHour: number
  low: number
  high: number | null
  legs: number
  hours: number
  compensated: boolean
}

export interface HoldTimeFigure {
  seconds: number
  low: number
  /** Null with a bound. */
  high: number | null
  /** `at-least`: `seconds` is the bound. */
  bound: null | 'at-least'
  holds: number
}

export type Cause = 'leak' | 'pump' | 'switch' | 'gas-space'

/** One day up to `at`: what the pump did, per 24 hours heard. */
export interface PumpDay {
  runsPerDay: number
  leakRunsPerDay: number
  pumpSecondsPerDay: number
  /** Null without the pump's amperes. */
  ampHoursPerDay: number | null
  hoursObserved: number
}

/** Rate, recharge, differential and the volume-free K = r/(R + r), now and as usual. */
export interface LeakSigns {
  ratePaPerSecond: number | null
  rechargePaPerSecond: number | null
  differentialPa: number | null
  ratio: number | null
}

/** The answer: everything of the summary, and what the outlook, the fleet and the notices build on. Plain JSON. */
export interface Figures {
  at: Instant
  state: SystemState
  /** Why the state is what it is, for a reader: "holds 2 h 10 min, under the limit of 3 h". */
  reason: string
  since: Instant | null
  leakRate: LeakRateFigure | null
  holdTime: HoldTimeFigure | null
  /** What the hold time rests on. */
  method: 'legs' | 'short-holds' | 'run-lengths' | 'none'
  cutOutPa: number | null
  settledPa: number | null
  cutInPa: number | null
  recharge: { paPerSecond: number; usualPaPerSecond: number | null } | null
  cause: Cause | null
  signs: { now: LeakSigns; usual: LeakSigns }
  current: {
    at: Instant
    vacuumPa: number | null
    pumpOn: boolean | null
    holdSoFarSeconds: number | null
  } | null
  pump: PumpDay | null
  lastHeardAt: Instant | null
  /** Lower is worse: orders a fleet, worst first. */
  rank: number
  /** What the outlook simulates from; null while learning. */
  model: LeakModel | null
}
