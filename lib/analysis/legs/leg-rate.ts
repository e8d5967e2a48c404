import type { LegBins, LegRow } from '../fold/types'
import { compensatedPressurePa, saturationVapourPressurePa } from '../gas'
import { theilSen, type Point } from '../statistics'
import { mergeBins } from './merge-bins'

const LEAST_SECONDS = 300
const LEAST_BINS = 8
/** Pairs grow with the square: 60 bins keep a leg under a millisecond and lose nothing of a straight line. */
const MOST_BINS = 60

/**
 * A leg's own leak rate for display and trend, Pa/h, > 0 loses vacuum: Theil–Sen slope of the compensated
 * absolute pressure over its bins, with the 95 % interval of the slope widened to cover dry and saturated gas.
 * The gas is taken to follow the air with the first lag. Missing air or barometer: that part is taken as
 * steady and `compensated` is false. Under 5 minutes or 8 bins (bins with NaN don't count): null. Readings
 * that are all alike give 0.
 * @param standardPressurePa ambient where there is no barometer
 */
export function legRate(bins: LegBins, standardPressurePa: number): LegRow['rate'] {
  const usable = bins.vacuumPa.flatMap((value, i) =>
    Number.isFinite(value) && Number.isFinite(bins.offsetSeconds[i]) ? [i] : [],
  )
  const first = bins.offsetSeconds[usable[0] ?? -1]
  const last = bins.offsetSeconds[usable.at(-1) ?? -1]
  if (usable.length < LEAST_BINS || first === undefined || last === undefined) return null
  if (last - first + bins.widthSeconds < LEAST_SECONDS) return null
  const points = mergeBins(bins, MOST_BINS)
  const hasAir = points.every((point) => Number.isFinite(point.laggedC))
  const hasBarometer = points.every((point) => Number.isFinite(point.barometerPa))
  const pressures = points.map((point): Point => {
    const reading = {
      vacuumPa: point.vacuumPa,
      barometerPa: hasBarometer ? point.barometerPa : null,
      gasTempC: hasAir ? point.laggedC : null,
    }
    return { x: point.offsetSeconds / 3600, y: compensatedPressurePa(reading, { standardPressurePa }) }
  })
  const slope = theilSen(pressures)
  if (slope === null) return null
  const doubt = hasAir ? Math.abs(halfVapourSlope(points)) : 0
  return {
    paPerHour: slope.slope,
    low: (slope.low ?? slope.slope) - doubt,
    high: (slope.high ?? slope.slope) + doubt,
    compensated: hasAir && hasBarometer,
  }
}

/** Slope of half the saturated vapour's pressure over the leg, Pa/h: how far s = ½ may be off either way. */
function halfVapourSlope(points: readonly { offsetSeconds: number; laggedC: number }[]): number {
  const first = points[0]
  const last = points.at(-1)
  if (first === undefined || last === undefined || last.offsetSeconds <= first.offsetSeconds) return 0
  const change = saturationVapourPressurePa(last.laggedC) - saturationVapourPressurePa(first.laggedC)
  return (0.5 * change * 3600) / (last.offsetSeconds - first.offsetSeconds)
}
