import { smoothNoise } from '../random'
import { MS_PER_DAY, MS_PER_HOUR, STANDARD_PRESSURE_PA } from './constants'

export type WeatherSpec = {
  /** Mean air temperature where the probe is, °C. */
  meanC: number
  /** Half the daily swing, °C; warmest at 15:00 local. */
  dailyC: number
  /** Standard deviation of the slow wander from day to day, °C. */
  wanderC: number
  meanBarometerPa: number
  /** Standard deviation of the passing highs and lows, Pa. */
  synopticPa: number
}

export type Weather = { airC: (atMs: number) => number; barometerPa: (atMs: number) => number }

export const STEADY_WEATHER: WeatherSpec = {
  meanC: 20,
  dailyC: 0,
  wanderC: 0,
  meanBarometerPa: STANDARD_PRESSURE_PA,
  synopticPa: 0,
}

/** Air and barometer as pure functions of true time: a daily cosine plus noise at two paces each. */
export function weatherOf(spec: WeatherSpec, seed: number, offsetSeconds: number): Weather {
  const airSlow = smoothNoise(seed, 11, 30 * MS_PER_HOUR)
  const airQuick = smoothNoise(seed, 12, 2 * MS_PER_HOUR)
  const pressureSlow = smoothNoise(seed, 13, 36 * MS_PER_HOUR)
  const pressureQuick = smoothNoise(seed, 14, 5 * MS_PER_HOUR)
  const warmestMs = 15 * MS_PER_HOUR - offsetSeconds * 1000
  const { meanC, dailyC, wanderC, meanBarometerPa, synopticPa } = spec
  return {
    airC: (at) => {
      const cycle = dailyC === 0 ? 0 : dailyC * Math.cos((2 * Math.PI * (at - warmestMs)) / MS_PER_DAY)
      return meanC + cycle + (wanderC === 0 ? 0 : wanderC * (0.95 * airSlow(at) + 0.3 * airQuick(at)))
    },
    barometerPa: (at) =>
      meanBarometerPa + (synopticPa === 0 ? 0 : synopticPa * (pressureSlow(at) + 0.12 * pressureQuick(at))),
  }
}
