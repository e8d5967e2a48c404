import { ZERO_CELSIUS_K } from './constants'

/**
 * Saturated vapour pressure of water over liquid, Pa, by Magnus's formula with the coefficients of
 * Alduchov & Eskridge (1996), good to 0.4 % from −40 to 50 °C. `saturationPressurePa(20) // 2333`
 */
export const saturationPressurePa = (celsius: number): number =>
  610.94 * Math.exp((17.625 * celsius) / (celsius + 243.04))

/**
 * Amount of air in a space as p·V/T, Pa·m³/K (n·R of the gas law): steady when nothing leaks, whatever
 * temperature and volume do.
 */
export const airAmount = (dryPressurePa: number, volumeM3: number, temperatureK: number): number =>
  (dryPressurePa * volumeM3) / temperatureK

/** Pressure of the air itself, Pa, of an amount in a volume at a temperature: p = (n·R)·T/V. */
export const dryPressurePa = (amountPaM3PerK: number, volumeM3: number, temperatureK: number): number =>
  (amountPaM3PerK * temperatureK) / volumeM3

export const toKelvin = (celsius: number): number => celsius + ZERO_CELSIUS_K
