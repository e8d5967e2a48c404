import { LAG_SECONDS, type Instant } from '../fold/types'
import { lagTemperature, type TemperaturePoint } from '../gas'
import type { GasResponse } from '../fit'
import { theilSen } from '../statistics'
import type { AirPoint } from './types'

const DAY_MS = 86_400_000

/**
 * How fast the weather will let the vacuum fall, Pa/s, in each step from `from` on: yesterday's air at the same
 * hours, shifted to meet the air now, through the gas's response to it; and the barometer, whose tendency of the last
 * hours is taken to die away over some more. What is not measured is taken as steady.
 */
export function weatherRates(
  air: readonly AirPoint[],
  response: GasResponse,
  from: Instant,
  stepSeconds: number,
  steps: number,
): Float64Array {
  const rates = barometerRates(air, from, stepSeconds, steps)
  const known = air.flatMap((point) => (point.airC === null ? [] : [{ at: point.at, airC: point.airC }]))
  const first = known[0]
  const last = known.at(-1)
  if (first === undefined || last === undefined || last.at - first.at < 0.8 * DAY_MS) return rates
  const airAt = interpolator(known)
  const shift = last.airC - airAt(last.at - DAY_MS)
  const past: TemperaturePoint[] = known
    .filter((point) => point.at < from)
    .map((point) => ({ atSeconds: point.at / 1000, airC: point.airC }))
  const future = Array.from({ length: steps + 1 }, (_, k): TemperaturePoint => {
    const at = from + k * stepSeconds * 1000
    const daysAhead = Math.max(0, Math.ceil((at - last.at) / DAY_MS))
    return { atSeconds: at / 1000, airC: airAt(at - daysAhead * DAY_MS) + (daysAhead > 0 ? shift : 0) }
  })
  const points = [...past, ...future]
  const curves = [0, ...LAG_SECONDS].map((lag) => lagTemperature(points, lag).slice(past.length))
  for (let k = 0; k < steps; k += 1) {
    curves.forEach((curve, j) => {
      const change = (curve[k + 1] ?? 0) - (curve[k] ?? 0)
      rates[k] = (rates[k] ?? 0) + ((response[j] ?? 0) * change) / stepSeconds
    })
  }
  return rates
}

const TENDENCY_MS = 6 * 3_600_000
const TENDENCY_LASTS_SECONDS = 6 * 3_600
/** How much of a tendency goes on at all (judged from simulated weather). */
const TENDENCY_KEPT = 0.7

/** A rising barometer deepens the vacuum, Pa/s in each step (negative: it holds longer). */
function barometerRates(
  air: readonly AirPoint[],
  from: Instant,
  stepSeconds: number,
  steps: number,
): Float64Array {
  const rates = new Float64Array(steps)
  const points = air.flatMap(({ at, barometerPa }) =>
    barometerPa === null || at < from - TENDENCY_MS || at > from ? [] : [{ x: at / 1000, y: barometerPa }],
  )
  const trend = points.length < 4 ? null : theilSen(points)
  if (trend === null) return rates
  for (let k = 0; k < steps; k += 1) {
    rates[k] = -TENDENCY_KEPT * trend.slope * Math.exp((-(k + 0.5) * stepSeconds) / TENDENCY_LASTS_SECONDS)
  }
  return rates
}

function interpolator(points: readonly { at: Instant; airC: number }[]): (at: Instant) => number {
  return (at) => {
    let low = 0
    let high = points.length - 1
    while (high - low > 1) {
      const middle = (low + high) >> 1
      if ((points[middle]?.at ?? 0) <= at) low = middle
      else high = middle
    }
    const before = points[low]
    const after = points[high]
    if (before === undefined || after === undefined) return 0
    const share = after.at > before.at ? (at - before.at) / (after.at - before.at) : 0
    return before.airC + (after.airC - before.airC) * Math.min(1, Math.max(0, share))
  }
}
