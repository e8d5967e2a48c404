import { STANDARD_PRESSURE_PA } from '@/shared/units'
import { AIR_GAS_CONSTANT } from './constants'

const LAPSE_K_PER_M = 0.0065
const SEA_LEVEL_K = 288.15
const GRAVITY_M_PER_S2 = 9.80665

/**
 * Pressure of the standard atmosphere, Pa, at a geopotential altitude in m (up to 11,000): ISO 2533:1975,
 * p = 101325·(1 − 0.0065·H/288.15)^(g/(0.0065·R)). For a boat geopotential and geometric altitude are
 * the same within 2 Pa. Beyond the troposphere's formula (H ≥ 44,330 m) NaN.
 * @example standardPressurePa(1000) // 89874.6
 */
export function standardPressurePa(altitudeM: number): number {
  const base = 1 - (LAPSE_K_PER_M * altitudeM) / SEA_LEVEL_K
  return STANDARD_PRESSURE_PA * Math.pow(base, GRAVITY_M_PER_S2 / (LAPSE_K_PER_M * AIR_GAS_CONSTANT))
}
