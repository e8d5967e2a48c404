import { MS_PER_SECOND } from './constants'
import { saturationPressurePa, toKelvin } from './gas'
import type { Surroundings } from './integrate'
import type { Weather } from './weather'

/** How walls and vapour follow the weather. */
export type GasSurroundings = { meanC: number; coupling: number; lagSeconds: number; wetness: number }

/** The walls' temperature and what surrounds the gas, from the weather at any instant. */
export function surroundingsOf(weather: Weather, gas: GasSurroundings) {
  /** Where the walls would settle if the weather stood still. */
  const wallTargetC = (at: number): number => gas.meanC + gas.coupling * (weather.airC(at) - gas.meanC)
  return {
    wallTargetC,
    /** First-order lag over one step, driven by the target at its middle. */
    wallAfter: (wallC: number, at: number, seconds: number): number => {
      if (gas.lagSeconds <= 0) return wallTargetC(at + seconds * MS_PER_SECOND)
      const target = wallTargetC(at + (seconds * MS_PER_SECOND) / 2)
      return wallC + (target - wallC) * (1 - Math.exp(-seconds / gas.lagSeconds))
    },
    around: (at: number, wallC: number): Surroundings => ({
      outsidePa: weather.barometerPa(at),
      outsideK: toKelvin(weather.airC(at)),
      wallK: toKelvin(wallC),
      vapourPa: gas.wetness > 0 ? gas.wetness * saturationPressurePa(wallC) : 0,
    }),
  }
}
