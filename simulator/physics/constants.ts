import { PA_PER_INHG, STANDARD_PRESSURE_PA, ZERO_CELSIUS_K } from '@/shared/units'

export { PA_PER_INHG, STANDARD_PRESSURE_PA, ZERO_CELSIUS_K }

/** Ratio of specific heats of air. */
export const GAMMA = 1.4
/** Specific gas constant of dry air, J/(kg·K): 8.31446261815324 / 0.0289652. */
export const AIR_GAS_CONSTANT = 287.05287
/** The steady temperature that hold times are stated for, K. */
export const REFERENCE_TEMPERATURE_K = ZERO_CELSIUS_K + 20
/** The vacuum at which a leak's size is stated: the middle of a 10/8 inHg switch. */
export const REFERENCE_VACUUM_PA = 9 * PA_PER_INHG
/** Discharge coefficient of a small sharp-edged hole. Common practice, no source; 0.6 to 0.65 in handbooks. */
export const DISCHARGE_COEFFICIENT = 0.62

export const MS_PER_SECOND = 1000
export const MS_PER_HOUR = 3_600_000
export const MS_PER_DAY = 86_400_000
