import {
  compensatedPressurePa,
  DEFAULT_VAPOUR_FRACTION,
  pressurePerKelvinPa,
  REFERENCE_TEMPERATURE_K,
  saturationVapourPressurePa,
} from '@/lib/analysis/gas'
import { celsiusToKelvin, SECONDS_PER_HOUR, STANDARD_PRESSURE_PA } from '@/shared/units'
import { fastTheilSen } from './theil-sen-fast'
import type { LegBins, LegRow } from './types'

export const RATE_LEAST_SECONDS = 300
export const RATE_LEAST_BINS = 8
/** The cost of a median of slopes is the square of the points: neighbours are joined down to this many. */
const MOST_POINTS = 40

/**
 * A leg's own leak rate, Pa/h (positive loses vacuum): Theil–Sen slope of the compensated absolute pressure
 * over the bins' mean times, 95 % interval. Gas temperature is the air lagged by 30 minutes (the first of
 * `LAG_SECONDS`), half of saturated vapour taken out, the interval widened to cover none and all of
 * it, and what walls and liquid may keep from the gas.
 * Null under 5 minutes or 8 bins. `compensated` only where every bin has air and barometer.
 */
export function legRate(bins: LegBins): LegRow['rate'] {
  const size = bins.offsetSeconds.length
  const first = bins.offsetSeconds[0] ?? 0
  const last = bins.offsetSeconds[size - 1] ?? 0
  if (size < RATE_LEAST_BINS || last - first < RATE_LEAST_SECONDS) return null
  const hasAir = bins.laggedAirC[0].every((air) => air !== null)
  const hasBarometer = bins.barometerPa.every((pa) => pa !== null)
  const { seconds, pressurePa, gasC } = joined(bins, hasAir, hasBarometer)
  const slope = fastTheilSen(seconds, pressurePa)
  if (slope === null) return null
  const doubt = hasAir ? vapourDoubt(seconds, gasC) + temperatureDoubt(bins) : 0
  const perHour = (perSecond: number): number => Math.round(perSecond * SECONDS_PER_HOUR * 1000) / 1000 + 0
  return {
    paPerHour: perHour(slope.slope),
    low: perHour(slope.low - doubt),
    high: perHour(slope.high + doubt),
    compensated: hasAir && hasBarometer,
  }
}

/** Count-weighted means of groups of neighbouring bins: times and compensated pressures. */
function joined(
  bins: LegBins,
  hasAir: boolean,
  hasBarometer: boolean,
): { seconds: number[]; pressurePa: number[]; gasC: number[] } {
  const size = bins.offsetSeconds.length
  const group = Math.ceil(size / MOST_POINTS)
  const seconds: number[] = []
  const pressurePa: number[] = []
  const gasC: number[] = []
  for (let from = 0; from < size; from += group) {
    let weight = 0
    let time = 0
    let pressure = 0
    let gas = 0
    for (let i = from; i < Math.min(size, from + group); i += 1) {
      const count = bins.count[i] ?? 0
      const gasTempC = hasAir ? (bins.laggedAirC[0][i] ?? null) : null
      weight += count
      time += count * (bins.offsetSeconds[i] ?? 0)
      gas += count * (gasTempC ?? 0)
      pressure +=
        count *
        compensatedPressurePa({
          vacuumPa: bins.vacuumPa[i] ?? 0,
          barometerPa: hasBarometer ? bins.barometerPa[i] : null,
          gasTempC,
        })
    }
    seconds.push(time / weight)
    pressurePa.push(pressure / weight)
    gasC.push(gas / weight)
  }
  return { seconds, pressurePa, gasC }
}

/** Share of the temperature correction that walls and liquid may keep from the gas (judged). */
const COUPLING_DOUBT = 0.4

/**
 * How far the rate moves with what is not known of the gas's temperature, Pa/s: a share of the correction
 * itself, and half of what the slower lag would make of it.
 */
function temperatureDoubt(bins: LegBins): number {
  const [faster, slower] = bins.laggedAirC
  const perKelvin = pressurePerKelvinPa(
    STANDARD_PRESSURE_PA - (bins.vacuumPa[0] ?? 0),
    faster[0] ?? 20,
    DEFAULT_VAPOUR_FRACTION,
  )
  const slope = (celsius: readonly (number | null)[]): number =>
    perKelvin *
    leastSquaresSlope(
      bins.offsetSeconds,
      celsius.map((value) => value ?? 0),
    )
  return COUPLING_DOUBT * Math.abs(slope(faster)) + 0.5 * Math.abs(slope(faster) - slope(slower))
}

/** Half a saturated vapour pressure's slope, Pa/s: how far the rate moves from a half to none or all. */
function vapourDoubt(seconds: readonly number[], gasC: readonly number[]): number {
  const vapour = gasC.map(
    (celsius) => (saturationVapourPressurePa(celsius) * REFERENCE_TEMPERATURE_K) / celsiusToKelvin(celsius),
  )
  return Math.abs(leastSquaresSlope(seconds, vapour)) * DEFAULT_VAPOUR_FRACTION
}

/** Slope of the least-squares line; 0 where x does not vary. */
export function leastSquaresSlope(x: readonly number[], y: readonly number[]): number {
  const size = x.length
  let sumX = 0
  let sumY = 0
  for (let i = 0; i < size; i += 1) {
    sumX += x[i] ?? 0
    sumY += y[i] ?? 0
  }
  let xy = 0
  let xx = 0
  for (let i = 0; i < size; i += 1) {
    const dx = (x[i] ?? 0) - sumX / size
    xy += dx * ((y[i] ?? 0) - sumY / size)
    xx += dx * dx
  }
  return xx > 0 ? xy / xx : 0
}
