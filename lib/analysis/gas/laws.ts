import { AIR_VISCOSITY_PA_S } from './constants'
import { isentropicFlowFunction } from './orifice'

/** How a leak's flow depends on the pressures on either side: through a hole, or along a fine crack. */
export type LeakLaw = 'orifice' | 'laminar'

/**
 * Inflow of an orifice relative to its own at a downstream pressure of `referencePa`: p_out·ψ(p/p_out).
 * Falls by 6 % from 10 to 8 inHg at one atmosphere. 0 once inside and outside are level.
 */
export function orificeDrive(ambientPa: number, insidePa: number): number {
  return ambientPa * isentropicFlowFunction(insidePa / ambientPa)
}

/**
 * Drive of laminar (viscous) flow along a capillary or crack, as a pressure: (p_out² − p²)/(2·p_out), so that
 * pV flow = conductance × drive (Poiseuille's law for a gas; e.g. J. F. O'Hanlon, A User's Guide to Vacuum
 * Technology). Falls by 17 % from 10 to 8 inHg. 0 where inside is not lower.
 */
export function laminarDrive(ambientPa: number, insidePa: number): number {
  return insidePa >= ambientPa ? 0 : (ambientPa * ambientPa - insidePa * insidePa) / (2 * ambientPa)
}

/** Drive of either law, Pa. */
export function leakDrive(law: LeakLaw, ambientPa: number, insidePa: number): number {
  return law === 'orifice' ? orificeDrive(ambientPa, insidePa) : laminarDrive(ambientPa, insidePa)
}

/**
 * Leak flow along a straight round capillary, Pa·m³/s: π·r⁴/(8·η·L)·(p_out² − p²)/2.
 */
export function capillaryLeakFlow(
  diameterM: number,
  lengthM: number,
  ambientPa: number,
  insidePa: number,
  viscosityPaS = AIR_VISCOSITY_PA_S,
): number {
  const conductance = (Math.PI * Math.pow(diameterM / 2, 4)) / (8 * viscosityPaS * lengthM)
  return conductance * ambientPa * laminarDrive(ambientPa, insidePa)
}

/**
 * Rate at vacuum `toVacuumPa` of a leak that was measured at `fromVacuumPa`: the ratio of the law's drives.
 * @returns a factor; NaN where the leak was measured without vacuum
 */
export function rateScale(law: LeakLaw, ambientPa: number, fromVacuumPa: number, toVacuumPa: number): number {
  return (
    leakDrive(law, ambientPa, ambientPa - toVacuumPa) / leakDrive(law, ambientPa, ambientPa - fromVacuumPa)
  )
}
