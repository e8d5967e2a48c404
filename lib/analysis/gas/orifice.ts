import { celsiusToKelvin } from '@/shared/units'
import { AIR_GAS_CONSTANT, AIR_HEAT_RATIO, REFERENCE_TEMPERATURE_K } from './constants'

/** Discharge coefficient of a small sharp-edged hole, used where none is measured (judged). */
export const SHARP_EDGE_COEFFICIENT = 0.65

export type OrificeConditions = {
  upstreamPa: number
  downstreamPa: number
  upstreamTempC?: number
  coefficient?: number
  heatRatio?: number
  gasConstant?: number
}

/**
 * Downstream over upstream pressure under which flow through a hole is choked: (2/(k+1))^(k/(k−1)),
 * 0.528 for air. Source: any text of gas dynamics (Anderson, White). Air into a vacuum chokes only deeper
 * than 14.1 inHg at one atmosphere: between 10 and 8 inHg it does not.
 */
export function criticalPressureRatio(heatRatio = AIR_HEAT_RATIO): number {
  return Math.pow(2 / (heatRatio + 1), heatRatio / (heatRatio - 1))
}

/**
 * Dimensionless isentropic flow ψ = ṁ·√(R·T)/(A·p) for a pressure ratio; constant once choked (0.6847 for
 * air), 0 at a ratio of 1 or more, and for NaN NaN.
 */
export function isentropicFlowFunction(pressureRatio: number, heatRatio = AIR_HEAT_RATIO): number {
  if (pressureRatio >= 1) return 0
  const ratio = Math.max(pressureRatio, criticalPressureRatio(heatRatio))
  const drop = Math.pow(ratio, 2 / heatRatio) - Math.pow(ratio, (heatRatio + 1) / heatRatio)
  return Math.sqrt(((2 * heatRatio) / (heatRatio - 1)) * drop)
}

/** Mass flow through a hole of `areaM2`, kg/s; 0 where the downstream pressure is not lower. */
export function orificeMassFlow(areaM2: number, conditions: OrificeConditions): number {
  const gasConstant = conditions.gasConstant ?? AIR_GAS_CONSTANT
  const tempK = celsiusToKelvin(conditions.upstreamTempC ?? 20)
  const flow = isentropicFlowFunction(conditions.downstreamPa / conditions.upstreamPa, conditions.heatRatio)
  const coefficient = conditions.coefficient ?? 1
  return (coefficient * areaM2 * conditions.upstreamPa * flow) / Math.sqrt(gasConstant * tempK)
}

/** The same as a leak flow (pV counted at 20 °C), Pa·m³/s. */
export function orificeLeakFlow(areaM2: number, conditions: OrificeConditions): number {
  const gasConstant = conditions.gasConstant ?? AIR_GAS_CONSTANT
  return orificeMassFlow(areaM2, conditions) * gasConstant * REFERENCE_TEMPERATURE_K
}

/** Area of a round hole, m². */
export const holeAreaM2 = (diameterM: number): number => (Math.PI / 4) * diameterM * diameterM

/**
 * Diameter of the round hole that would let in `flowPaM3PerS` (pV at 20 °C), m, by isentropic flow with
 * the stated coefficient (default 0.65, sharp edge). 0 for no flow or an inflow that is negative; null
 * where there is no pressure difference to drive one.
 * @example equivalentHoleDiameterM(0.01, { upstreamPa: 101325, downstreamPa: 67461 }) // 3.2e-5
 */
export function equivalentHoleDiameterM(flowPaM3PerS: number, conditions: OrificeConditions): number | null {
  if (flowPaM3PerS <= 0) return 0
  const coefficient = conditions.coefficient ?? SHARP_EDGE_COEFFICIENT
  const flowPerM2 = orificeLeakFlow(1, { ...conditions, coefficient })
  if (!(flowPerM2 > 0)) return null
  return Math.sqrt((4 * flowPaM3PerS) / (Math.PI * flowPerM2))
}

/** A hole in words, for people who do not think in micrometres. */
export function holeInWords(diameterM: number | null): string {
  if (diameterM === null || !Number.isFinite(diameterM)) return 'of unknown size'
  const known = HOLE_WORDS.find((entry) => diameterM < entry.underM)
  return known === undefined ? 'wider than a pencil lead' : known.words
}

/** Usual sizes: a hair 50 to 90 µm, a sheet of paper 0.1 mm, a sewing pin 0.6 mm (common practice, no source). */
const HOLE_WORDS = [
  { underM: 1e-6, words: 'no hole to speak of' },
  { underM: 5e-5, words: 'thinner than a hair' },
  { underM: 9e-5, words: 'about as thick as a hair' },
  { underM: 2.5e-4, words: 'a few hairs thick' },
  { underM: 7e-4, words: 'about a sewing pin' },
  { underM: 1.5e-3, words: 'about a pencil lead' },
]
