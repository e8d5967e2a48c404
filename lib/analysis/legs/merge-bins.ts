import type { LegBins } from '../fold/types'

export interface LegPoint {
  /** Mean time after the leg's start, s. */
  offsetSeconds: number
  vacuumPa: number
  /** Air as measured and through the two lags, °C; NaN where unknown, as the barometer. */
  airC: number
  laggedC: number
  slowC: number
  barometerPa: number
}

/**
 * A leg's bins as at most `most` points, neighbours averaged. Bins without a finite vacuum or time, and those
 * before `fromSeconds`, are left out. Nothing usable: an empty list.
 */
export function mergeBins(bins: LegBins, most: number, fromSeconds = 0): LegPoint[] {
  const { offsetSeconds, vacuumPa, airC, laggedAirC, barometerPa } = bins
  const usable = offsetSeconds.flatMap((offset, i) =>
    Number.isFinite(vacuumPa[i]) && Number.isFinite(offset) && offset >= fromSeconds ? [i] : [],
  )
  const stride = Math.max(1, Math.ceil(usable.length / most))
  const points: LegPoint[] = []
  for (let from = 0; from < usable.length; from += stride) {
    const group = usable.slice(from, from + stride)
    const mean = (values: readonly (number | null)[]): number => {
      let sum = 0
      for (const i of group) sum += values[i] ?? NaN
      return sum / group.length
    }
    points.push({
      offsetSeconds: mean(offsetSeconds),
      vacuumPa: mean(vacuumPa),
      airC: mean(airC),
      laggedC: mean(laggedAirC[0]),
      slowC: mean(laggedAirC[1]),
      barometerPa: mean(barometerPa),
    })
  }
  return points
}
