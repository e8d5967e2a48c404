/** Temperature to which gas is reduced, so that days compare: 20 °C. */
export const REFERENCE_TEMPERATURE_K = 293.15
/** Molar gas constant, J/(mol·K), exact in the SI of 2019. */
export const MOLAR_GAS_CONSTANT = 8.31446261815324
/** Specific gas constant of dry air, J/(kg·K), ISO 2533:1975. */
export const AIR_GAS_CONSTANT = 287.05287
/** Ratio of specific heats of air. */
export const AIR_HEAT_RATIO = 1.4
/** Dynamic viscosity of air at 20 °C, Pa·s (Sutherland's formula). */
export const AIR_VISCOSITY_PA_S = 1.813e-5
/** Share of saturated vapour taken when the boat has not taught it: half, its interval covering 0 to 1. */
export const DEFAULT_VAPOUR_FRACTION = 0.5
