/** A hold as far as comparing needs it; times epoch milliseconds. */
export type ComparedHold = {
  startedAt: number
  endedAt: number
  ending: 'leak' | 'flush' | 'unknown' | 'interrupted' | 'open'
  leakRate: { paPerHour: number; low: number; high: number } | null
  /** Flushes within it that did not start the pump; they shorten it. */
  flushes?: number
  /** Worked on or laid up then: left out. */
  setAside?: boolean
}

/** A run of the pump; a recharge rate that was not measured is null. */
export type ComparedRun = {
  startedAt: number
  stoppedAt: number
  rechargePaPerSecond: number | null
  /** What started it, where that is known: tells how the hold before ended if nothing measured vacuum. */
  trigger?: 'leak' | 'flush' | 'startup' | 'unknown'
}

export type ComparedPeriod = {
  from: number
  to: number
  holds: readonly ComparedHold[]
  runs: readonly ComparedRun[]
  /** Settled top minus cut-in, as learned then; null = not known. */
  differentialPa: number | null
  /** How much of the period was observed; all of it where absent. */
  observedSeconds?: number
}

export type PeriodFigures = {
  holds: number
  holdTimeSeconds: number | null
  leakRatePaPerHour: number | null
  rechargePaPerSecond: number | null
  runsPerDay: number | null
  pumpSecondsPerDay: number | null
  ampHoursPerDay: number | null
}

/** r, R, D and the volume-free K = r/(R + r). */
export type Signs = {
  ratePaPerSecond: number | null
  rechargePaPerSecond: number | null
  differentialPa: number | null
  ratio: number | null
}

export type RepairVerdict = 'held' | 'better-under-limit' | 'no-change' | 'worse' | 'too-early'

export type Comparison = {
  before: PeriodFigures
  after: PeriodFigures
  /** Hold time after over before; ends null where unbounded. */
  ratio: { value: number; low: number | null; high: number | null } | null
  pValue: number | null
  verdict: RepairVerdict
  /** More quiet hours until it can be told; null once it is. */
  hoursNeeded: number | null
  signs: { before: Signs; after: Signs }
  /** What else than the leak explains a changed hold time; null where nothing does. */
  because: 'gas-space' | 'switch' | null
}
