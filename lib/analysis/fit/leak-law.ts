import { isentropicFlowFunction } from '../gas'
import type { LeakLawFit } from './types'

/** Orifice drive, Pa: p_out·ψ(p/p_out). `insidePa` absolute. */
export const orificeDrivePa = (ambientPa: number, insidePa: number): number =>
  ambientPa * isentropicFlowFunction(insidePa / ambientPa)

/**
 * Laminar drive against a fixed reference, Pa: (p_out² − p²)/(2·p_ref). Poiseuille's flow goes with the
 * difference of squares alone, so that days of high and low barometer share one coefficient.
 */
export const laminarDrivePa = (ambientPa: number, insidePa: number, referencePa: number): number =>
  insidePa >= ambientPa ? 0 : (ambientPa * ambientPa - insidePa * insidePa) / (2 * referencePa)

/**
 * Rate at which the law loses vacuum, Pa/h, at a vacuum and an ambient pressure; 0 at no vacuum.
 * @example ratePaPerHourAt({ orificePaPerHour: 2032, laminarPaPerHour: 0, midPa: 30477, standardPressurePa: 101325 }, 30477)
 */
export function ratePaPerHourAt(
  law: LeakLawFit,
  vacuumPa: number,
  ambientPa = law.standardPressurePa,
): number {
  const { midPa, standardPressurePa } = law
  const middlePa = standardPressurePa - midPa
  const orifice =
    orificeDrivePa(ambientPa, ambientPa - vacuumPa) / orificeDrivePa(standardPressurePa, middlePa)
  const laminar =
    laminarDrivePa(ambientPa, ambientPa - vacuumPa, standardPressurePa) /
    laminarDrivePa(standardPressurePa, middlePa, standardPressurePa)
  return law.orificePaPerHour * orifice + law.laminarPaPerHour * laminar
}

const PANELS = 16

/**
 * Time to lose vacuum from `fromPa` to `toPa` at steady 20 °C and standard pressure, s: ∫ dp / rate by
 * Simpson's rule. 0 where `fromPa` is not the greater; infinite where the law lets nothing in.
 */
export function holdSecondsOf(law: LeakLawFit, fromPa: number, toPa: number): number {
  if (!(fromPa > toPa)) return 0
  const width = (fromPa - toPa) / PANELS
  let sum = 0
  for (let i = 0; i <= PANELS; i += 1) {
    const rate = ratePaPerHourAt(law, toPa + i * width)
    if (!(rate > 0)) return Infinity
    sum += (i === 0 || i === PANELS ? 1 : i % 2 === 1 ? 4 : 2) / rate
  }
  return ((sum * width) / 3) * 3600
}
