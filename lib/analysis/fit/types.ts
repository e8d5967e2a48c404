/**
 * What is known of how a system's vacuum decays, as plain data that can be stored and read again.
 * dp/dt at steady 20 °C = orificePerS · O(p) + laminarPerS · L(p), with the two laws' drives in Pa.
 */
export interface LeakModel {
  /** 1/s, both ≥ 0. Null where only the length of holds is known (pump only, short cycling). */
  law: { orificePerS: number; laminarPerS: number } | null
  /** Hold time at steady 20 °C and standard pressure, with its 95 % interval; `highSeconds` null = open. */
  holdSeconds: number
  lowSeconds: number
  highSeconds: number | null
  bound: null | 'at-least'
  /** Standard deviation of the logarithm of the hold time. */
  logSigma: number
  /** Ambient pressure that "standard" means at this place, Pa. */
  standardPressurePa: number
  cutOutPa: number | null
  /** Where a hold starts from once the gas has settled. */
  settledPa: number | null
  cutInPa: number | null
  /** Share of saturated vapour removed, and which air stands for the gas's: as measured or a lag of so many seconds. */
  vapourFraction: number
  lagSeconds: number
  compensated: boolean
}
