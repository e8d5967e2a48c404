import { celsiusToKelvin, SECONDS_PER_HOUR } from '@/shared/units'
import { MOLAR_GAS_CONSTANT, REFERENCE_TEMPERATURE_K } from './constants'

/**
 * Leak flow of a closed volume from its rise in absolute pressure, Pa·m³/s: q = V·(p2 − p1)/t at constant
 * temperature; with temperatures q = V·T_ref·(p2/T2 − p1/T1)/t, counted at 20 °C. The pressure change method
 * of EN 1779 (technique D), formula from memory. Infinite for no time.
 */
export function leakFlowPaM3PerS(
  volumeM3: number,
  start: { pressurePa: number; tempC?: number },
  end: { pressurePa: number; tempC?: number },
  seconds: number,
): number {
  if (start.tempC === undefined || end.tempC === undefined) {
    return (volumeM3 * (end.pressurePa - start.pressurePa)) / seconds
  }
  const reduced = (reading: { pressurePa: number }, tempC: number) =>
    reading.pressurePa / celsiusToKelvin(tempC)
  return (
    (volumeM3 * REFERENCE_TEMPERATURE_K * (reduced(end, end.tempC) - reduced(start, start.tempC))) / seconds
  )
}

/**
 * Vacuum-decay leak rate, mol/s: n = (V/R)·(p2/T2 − p1/T1)/(t2 − t1). Source: 40 CFR 1065.644,
 * Eq. 1065.644-1. Temperatures in K.
 */
export function vacuumDecayMolPerS(
  volumeM3: number,
  start: { pressurePa: number; tempK: number },
  end: { pressurePa: number; tempK: number },
  seconds: number,
  gasConstant = MOLAR_GAS_CONSTANT,
): number {
  return ((volumeM3 / gasConstant) * (end.pressurePa / end.tempK - start.pressurePa / start.tempK)) / seconds
}

/** Leak flow of a rate in a gas volume, Pa·m³/s, and back. Rates in Pa/h. */
export const flowOfRate = (paPerHour: number, volumeM3: number): number =>
  (paPerHour * volumeM3) / SECONDS_PER_HOUR
export const rateOfFlow = (flowPaM3PerS: number, volumeM3: number): number =>
  (flowPaM3PerS * SECONDS_PER_HOUR) / volumeM3

/** Amount of gas of a pV flow at a temperature, mol/s, and back. */
export const molPerSOfFlow = (flowPaM3PerS: number, tempK = REFERENCE_TEMPERATURE_K): number =>
  flowPaM3PerS / (MOLAR_GAS_CONSTANT * tempK)
export const flowOfMolPerS = (molPerS: number, tempK = REFERENCE_TEMPERATURE_K): number =>
  molPerS * MOLAR_GAS_CONSTANT * tempK

/** Hold time at a steady rate, s: differential over rate; null where it does not lose vacuum. */
export function holdSecondsAtRate(differentialPa: number, paPerHour: number): number | null {
  return paPerHour > 0 ? (differentialPa / paPerHour) * SECONDS_PER_HOUR : null
}
