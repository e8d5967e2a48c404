import { celsiusToKelvin, STANDARD_PRESSURE_PA } from '@/shared/units'
import { DEFAULT_VAPOUR_FRACTION, REFERENCE_TEMPERATURE_K } from './constants'
import { saturationVapourPressurePa } from './vapour'

export type GasReading = {
  vacuumPa: number
  /** Ambient pressure; null or absent = not measured, the place's standard pressure stands in. */
  barometerPa?: number | null
  /** Temperature of the gas itself (see `lagTemperature`); null or absent = not measured. */
  gasTempC?: number | null
}
export type CompensationOptions = {
  /** Share of saturated water vapour in the gas, 0 to 1. */
  vapourFraction?: number
  /** Ambient pressure where there is no barometer, Pa. */
  standardPressurePa?: number
}

/** Absolute pressure in the system, Pa: ambient minus vacuum. */
export function absolutePressurePa(vacuumPa: number, barometerPa: number): number {
  return barometerPa - vacuumPa
}

/**
 * Pressure of the dry gas reduced to 20 °C, Pa: (barometer − vacuum − s·p_sat(T)) · 293.15/T. In a closed
 * rigid system that does not leak it stays the same through weather and temperature (p·V = n·R·T), so its
 * rise is what leaked in. A channel that is not measured is taken as steady: no temperature, no reduction
 * and no vapour removed; no barometer, the standard pressure. NaN in, NaN out.
 * @example compensatedPressurePa({ vacuumPa: 33864, barometerPa: 101325, gasTempC: 25 }, { vapourFraction: 0 })
 */
export function compensatedPressurePa(reading: GasReading, options: CompensationOptions = {}): number {
  const ambientPa = reading.barometerPa ?? options.standardPressurePa ?? STANDARD_PRESSURE_PA
  const pressurePa = absolutePressurePa(reading.vacuumPa, ambientPa)
  if (reading.gasTempC === null || reading.gasTempC === undefined) return pressurePa
  const vapourPa =
    (options.vapourFraction ?? DEFAULT_VAPOUR_FRACTION) * saturationVapourPressurePa(reading.gasTempC)
  return ((pressurePa - vapourPa) * REFERENCE_TEMPERATURE_K) / celsiusToKelvin(reading.gasTempC)
}

/** Whether a stretch of readings counts as corrected: by temperature, by barometer, by both or not at all. */
export function compensationOf(
  readings: readonly GasReading[],
): 'full' | 'temperature' | 'barometer' | 'none' {
  const has = (pick: (reading: GasReading) => number | null | undefined) =>
    readings.length > 0 && readings.every((reading) => typeof pick(reading) === 'number')
  const temperature = has((reading) => reading.gasTempC)
  const barometer = has((reading) => reading.barometerPa)
  if (temperature && barometer) return 'full'
  if (temperature) return 'temperature'
  return barometer ? 'barometer' : 'none'
}

/** Pressure of a sealed rigid volume after its gas went from one temperature to another, Pa (p/T constant). */
export function pressureAfterTemperaturePa(pressurePa: number, fromC: number, toC: number): number {
  return (pressurePa * celsiusToKelvin(toC)) / celsiusToKelvin(fromC)
}

/**
 * What one degree does to the gauge, Pa per K: dry gas p/T plus, where it is wet, the slope of s·p_sat.
 * At 10 inHg and 20 °C 0.07 inHg dry, 0.11 inHg with saturated vapour.
 */
export function pressurePerKelvinPa(pressurePa: number, gasTempC: number, vapourFraction = 0): number {
  const vapourPa = vapourFraction * saturationVapourPressurePa(gasTempC)
  // A central difference one kelvin wide.
  const saturationSlope =
    saturationVapourPressurePa(gasTempC + 0.5) - saturationVapourPressurePa(gasTempC - 0.5)
  return (pressurePa - vapourPa) / celsiusToKelvin(gasTempC) + vapourFraction * saturationSlope
}
