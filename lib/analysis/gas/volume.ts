import { STANDARD_PRESSURE_PA } from '@/shared/units'

/** Volume of a round hose, m³: π/4·d²·L. */
export function hoseVolumeM3(innerDiameterM: number, lengthM: number): number {
  return (Math.PI / 4) * innerDiameterM * innerDiameterM * lengthM
}

/** Gas volume of a system from its parts, m³. 0 for none. */
export function volumeOfPartsM3(
  tanksM3: readonly number[],
  hoses: readonly { innerDiameterM: number; lengthM: number }[],
): number {
  const tanks = tanksM3.reduce((sum, volume) => sum + volume, 0)
  return hoses.reduce((sum, hose) => sum + hoseVolumeM3(hose.innerDiameterM, hose.lengthM), tanks)
}

/**
 * Gas volume of a closed system by letting in a syringe of outside air: ΔV·p_atm/Δp (Boyle's law at
 * constant temperature). Null where the vacuum did not fall.
 * @example volumeBySyringeM3(0.0001, 338.6) // 0.0299 m³: 100 mL moved it by 0.1 inHg
 */
export function volumeBySyringeM3(
  letInM3: number,
  vacuumFellPa: number,
  ambientPa = STANDARD_PRESSURE_PA,
): number | null {
  return vacuumFellPa > 0 ? (letInM3 * ambientPa) / vacuumFellPa : null
}
