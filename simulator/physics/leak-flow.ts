import {
  AIR_GAS_CONSTANT,
  DISCHARGE_COEFFICIENT,
  GAMMA,
  REFERENCE_TEMPERATURE_K,
  REFERENCE_VACUUM_PA,
  STANDARD_PRESSURE_PA,
} from './constants'

/** Below this ratio of inside to outside pressure the hole is choked: 0.5283 for air. */
export const CRITICAL_RATIO = (2 / (GAMMA + 1)) ** (GAMMA / (GAMMA - 1))

const CHOKED = Math.sqrt(GAMMA) * (2 / (GAMMA + 1)) ** ((GAMMA + 1) / (2 * (GAMMA - 1)))
const FACTOR = (2 * GAMMA) / (GAMMA - 1)

/**
 * Dimensionless mass flow m·√(R·T)/(A·p) of an ideal nozzle (isentropic flow, e.g. Anderson, *Modern
 * Compressible Flow*, ch. 5): 0 at equal pressures, 0.6847 when choked. `ratio` is inside over outside, ≤ 1.
 */
export function nozzleFunction(ratio: number): number {
  if (ratio >= 1) return 0
  if (ratio <= CRITICAL_RATIO) return CHOKED
  const log = Math.log(ratio)
  return Math.sqrt(FACTOR * Math.exp((2 / GAMMA) * log) * (1 - Math.exp(((GAMMA - 1) / GAMMA) * log)))
}

/**
 * Air let in by holes of total effective area `effectiveAreaM2` (coefficient × area), as d(p·V/T)/dt in
 * Pa·m³/(K·s). Negative when the inside is above the outside.
 */
export function orificeInflow(
  effectiveAreaM2: number,
  outsidePa: number,
  insidePa: number,
  outsideK: number,
): number {
  if (insidePa > outsidePa) return -orificeInflow(effectiveAreaM2, insidePa, outsidePa, outsideK)
  return (
    effectiveAreaM2 *
    outsidePa *
    Math.sqrt(AIR_GAS_CONSTANT / outsideK) *
    nozzleFunction(insidePa / outsidePa)
  )
}

/** Air let in by fine channels (laminar, compressible Poiseuille): C·(p_out² − p_in²)/T, Pa·m³/(K·s). */
export const laminarInflow = (
  conductance: number,
  outsidePa: number,
  insidePa: number,
  outsideK: number,
): number => (conductance * (outsidePa * outsidePa - insidePa * insidePa)) / outsideK

/** Both laws at once, the whole leak of a space: pV flow over temperature, Pa·m³/(K·s). */
export const leakInflow = (law: LeakLaw, outsidePa: number, insidePa: number, outsideK: number): number =>
  orificeInflow(law.areaM2, outsidePa, insidePa, outsideK) +
  laminarInflow(law.conductance, outsidePa, insidePa, outsideK)

/** Any number of leaks add up to these two coefficients: effective area (m²) and conductance (m³/(Pa·s)). */
export type LeakLaw = { areaM2: number; conductance: number }

const referenceInside = STANDARD_PRESSURE_PA - REFERENCE_VACUUM_PA

/** Effective area whose pV flow is `flowPaM3PerS` at 9 inHg, 20 °C and standard pressure. */
export const areaForFlow = (flowPaM3PerS: number): number =>
  flowPaM3PerS /
  (REFERENCE_TEMPERATURE_K * orificeInflow(1, STANDARD_PRESSURE_PA, referenceInside, REFERENCE_TEMPERATURE_K))

/** Conductance whose pV flow is `flowPaM3PerS` at 9 inHg, 20 °C and standard pressure. */
export const conductanceForFlow = (flowPaM3PerS: number): number =>
  flowPaM3PerS / (STANDARD_PRESSURE_PA * STANDARD_PRESSURE_PA - referenceInside * referenceInside)

/** pV flow at 9 inHg, 20 °C of a round hole. `flowOfHole(0.0001) // about 0.09 Pa·m³/s` */
export const flowOfHole = (diameterM: number, coefficient = DISCHARGE_COEFFICIENT): number =>
  REFERENCE_TEMPERATURE_K *
  orificeInflow(
    (coefficient * Math.PI * diameterM * diameterM) / 4,
    STANDARD_PRESSURE_PA,
    referenceInside,
    REFERENCE_TEMPERATURE_K,
  )

/**
 * Seconds that a space needs to lose vacuum from `cutOutPa` to `cutInPa` at steady 20 °C and a steady
 * outside pressure: ∫ V dp / Q(p) by Simpson's rule (64 panels: exact to 1e-9 for these smooth laws).
 * Infinity without a leak.
 */
export function holdSeconds(
  law: LeakLaw,
  volumeM3: number,
  cutOutPa: number,
  cutInPa: number,
  outsidePa = STANDARD_PRESSURE_PA,
): number {
  const panels = 64
  const width = (cutOutPa - cutInPa) / panels
  let sum = 0
  for (let i = 0; i <= panels; i++) {
    const inside = outsidePa - (cutInPa + width * i)
    const flow = REFERENCE_TEMPERATURE_K * leakInflow(law, outsidePa, inside, REFERENCE_TEMPERATURE_K)
    if (flow <= 0) return Number.POSITIVE_INFINITY
    sum += (i === 0 || i === panels ? 1 : i % 2 === 1 ? 4 : 2) / flow
  }
  return (volumeM3 * sum * width) / 3
}

/** The leak flow (at 9 inHg) of one kind with which a space holds for `seconds`. */
export function flowForHold(
  kind: 'orifice' | 'laminar',
  seconds: number,
  volumeM3: number,
  cutOutPa: number,
  cutInPa: number,
): number {
  const law: LeakLaw =
    kind === 'orifice'
      ? { areaM2: areaForFlow(1), conductance: 0 }
      : { areaM2: 0, conductance: conductanceForFlow(1) }
  return holdSeconds(law, volumeM3, cutOutPa, cutInPa) / seconds
}
