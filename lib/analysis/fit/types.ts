/** Pressure of the gas per degree of the air as measured and of its two lagged copies (`LAG_SECONDS`), Pa/K. */
export type GasResponse = readonly [number, number, number]

/**
 * The fitted leak of a system in rates at the middle of its band: an orifice and a laminar part, Pa/h at
 * steady 20 °C and standard pressure, each ≥ 0.
 */
export interface LeakLawFit {
  orificePaPerHour: number
  laminarPaPerHour: number
  /** Vacuum at which these rates hold, Pa. */
  midPa: number
  standardPressurePa: number
}

/** What is known of how a system's vacuum decays, as plain data that can be stored and read again. */
export interface LeakModel {
  /** Null where only the length of holds is known (pump only). */
  law: LeakLawFit | null
  gasResponse: GasResponse
  /** Hold time at steady 20 °C and standard pressure, with its 95 % interval; `highSeconds` null = open. */
  holdSeconds: number
  lowSeconds: number
  highSeconds: number | null
  bound: null | 'at-least'
  /** Standard deviation of the logarithm of the hold time. */
  logSigma: number
  /** The hold as it is seen to last, from the settled top, s: what the next nights bring. */
  observedHoldSeconds: number
  standardPressurePa: number
  cutOutPa: number | null
  settledPa: number | null
  cutInPa: number | null
  compensated: boolean
}
