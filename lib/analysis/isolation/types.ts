export type PartKind = 'head' | 'hose' | 'tank' | 'switch' | 'pump'

export type IsolationPart = {
  key: string
  kind: PartKind
  volumeM3: number
  /** What people call it; the key where absent. */
  name?: string
  /** Key of the next part towards the tank. */
  parent?: string | null
}

/** A leak-down reading of some of the parts closed off together. */
export type IsolationTest = {
  parts: readonly string[]
  /** Vacuum at the first and the last reading, Pa. */
  startPa: number
  endPa: number
  seconds: number
  resolutionPa?: number
  airStartCel?: number
  airEndCel?: number
  barometerStartPa?: number
  barometerEndPa?: number
}

/** A test that could be made: what is in it, and the minutes of taking off and refitting. */
export type PossibleTest = { parts: readonly string[]; minutes: number }

export type IsolationInput = {
  parts: readonly IsolationPart[]
  tests: readonly IsolationTest[]
  /** The tests to choose from; those of the drawing where absent. */
  possible?: readonly PossibleTest[]
  /** What the boat's record says about single parts: factors on the prior, 1 where absent. */
  priorFactors?: Readonly<Record<string, number>>
  /** What the hand gauge can be read to, for the minutes of the next test. */
  gaugeResolutionPa?: number
}

/**
 * Leak flow of a part with its 95 % interval, Pa·m³/s; `high` is the bound of a part that is cleared, null
 * where nothing bounds it.
 */
export type Share = { key: string; flowPaM3PerS: number; low: number; high: number | null; share: number }
export type Suspect = { key: string; probability: number }
export type Contradiction = { tests: number[]; repeat: number }
export type NextTest = {
  parts: string[]
  why: string
  /** All of it: taking off, settling and waiting, refitting. */
  minutes: number
  /** Between the two readings, at least. */
  waitMinutes: number
}

export type IsolationResult = {
  shares: Share[]
  suspects: Suspect[]
  inseparable: string[][]
  contradictions: Contradiction[]
  next: NextTest | null
}
