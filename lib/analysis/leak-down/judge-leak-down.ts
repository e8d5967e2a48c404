import {
  compensatedPressurePa,
  compensationOf,
  equivalentHoleDiameterM,
  flowOfRate,
  holdSecondsAtRate,
} from '@/lib/analysis/gas'
import { SECONDS_PER_HOUR, STANDARD_PRESSURE_PA } from '@/shared/units'
import {
  DEFAULT_DIFFERENTIAL_PA,
  DEFAULT_HOLD_LIMITS,
  DIFFERENCE_95_IN_STEPS,
  GAUGE_RESOLUTION_PA,
  type HoldLimits,
} from './limits'
import { judgeRate, type LeakDownVerdict } from './verdict'

export type LeakDownInput = {
  /** Vacuum at the first and at the second reading, Pa, positive. */
  startPa: number
  endPa: number
  seconds: number
  resolutionPa?: number
  volumeM3?: number
  /** Cut-out minus cut-in; 1.8 inHg where not given. */
  differentialPa?: number
  airStartCel?: number
  airEndCel?: number
  barometerStartPa?: number
  barometerEndPa?: number
}

export type LeakDownResult = {
  /** As read; positive loses vacuum. */
  paPerHour: number
  /** Corrected for what was measured of temperature and barometer; null where neither was at both ends. */
  compensatedPaPerHour: number | null
  /** 95 % interval of the better of the two. */
  low: number
  high: number
  /** At the better rate; null where nothing is lost. */
  holdSeconds: number | null
  verdict: LeakDownVerdict
  moreMinutes: number | null
  flowPaM3PerS: number | null
  holeDiameterM: number | null
  corrected: 'full' | 'temperature' | 'barometer' | 'none'
  /** The air moved more than 2 °C: the gas lags behind it, and vapour makes the correction doubtful. */
  airMoved: boolean
}

const AIR_MOVED_CEL = 2

/**
 * A leak-down test from two readings: rate, interval from what the gauge can be read to (and, with
 * temperature, from the share of water vapour being anything from none to all), hold time, verdict,
 * and with a volume leak flow and equivalent hole (isentropic, coefficient 0.65).
 * Throws a RangeError where no time passed or a reading is not finite.
 * @example judgeLeakDown({ startPa: 33864, endPa: 32848, seconds: 1800 }).verdict // 'cannot-tell': right at the limit
 */
export function judgeLeakDown(
  input: LeakDownInput,
  limits: HoldLimits = DEFAULT_HOLD_LIMITS,
): LeakDownResult {
  const { startPa, endPa, seconds } = input
  if (!(seconds > 0) || !Number.isFinite(startPa) || !Number.isFinite(endPa)) {
    throw new RangeError('two readings some time apart')
  }
  const perHour = SECONDS_PER_HOUR / seconds
  const asRead = (startPa - endPa) * perHour
  const correction = correctedRise(input)
  const best = correction === null ? asRead : correction.risePa * perHour
  const gaugePa = DIFFERENCE_95_IN_STEPS * (input.resolutionPa ?? GAUGE_RESOLUTION_PA.digital)
  const low = best - (gaugePa + (correction?.belowPa ?? 0)) * perHour
  const high = best + (gaugePa + (correction?.abovePa ?? 0)) * perHour
  const differentialPa = input.differentialPa ?? DEFAULT_DIFFERENTIAL_PA
  const flow = input.volumeM3 === undefined ? null : flowOfRate(best, input.volumeM3)
  return {
    paPerHour: asRead,
    compensatedPaPerHour: correction === null ? null : best,
    low,
    high,
    holdSeconds: holdSecondsAtRate(differentialPa, best),
    ...judgeRate({ paPerHour: best, low, high }, seconds, differentialPa, limits),
    flowPaM3PerS: flow,
    holeDiameterM: flow === null || flow <= 0 ? null : holeOf(flow, input),
    corrected: correction?.corrected ?? 'none',
    airMoved: Math.abs((input.airEndCel ?? 0) - (input.airStartCel ?? 0)) > AIR_MOVED_CEL && hasAir(input),
  }
}

const hasAir = (input: LeakDownInput) => input.airStartCel !== undefined && input.airEndCel !== undefined

function correctedRise(input: LeakDownInput) {
  const air = hasAir(input)
  const barometer = input.barometerStartPa !== undefined && input.barometerEndPa !== undefined
  // One reading of the barometer still says how much gas there is to warm.
  const steadyPa = input.barometerStartPa ?? input.barometerEndPa ?? null
  const readings = [
    { vacuumPa: input.startPa, air: input.airStartCel, barometer: input.barometerStartPa },
    { vacuumPa: input.endPa, air: input.airEndCel, barometer: input.barometerEndPa },
  ].map((reading) => ({
    vacuumPa: reading.vacuumPa,
    gasTempC: air ? (reading.air ?? null) : null,
    barometerPa: barometer ? (reading.barometer ?? null) : null,
  }))
  const corrected = compensationOf(readings)
  if (corrected === 'none') return null
  const rise = (vapourFraction: number) => {
    const [start, end] = readings.map((reading) =>
      compensatedPressurePa({ ...reading, barometerPa: reading.barometerPa ?? steadyPa }, { vapourFraction }),
    )
    return (end ?? NaN) - (start ?? NaN)
  }
  const risePa = rise(0.5)
  const ends = [rise(0), rise(1)]
  return {
    corrected,
    risePa,
    belowPa: risePa - Math.min(risePa, ...ends),
    abovePa: Math.max(risePa, ...ends) - risePa,
  }
}

function holeOf(flow: number, input: LeakDownInput): number | null {
  const ambientPa = input.barometerStartPa ?? input.barometerEndPa ?? STANDARD_PRESSURE_PA
  const insidePa = ambientPa - (input.startPa + input.endPa) / 2
  return equivalentHoleDiameterM(flow, {
    upstreamPa: ambientPa,
    downstreamPa: insidePa,
    upstreamTempC: input.airStartCel,
  })
}
