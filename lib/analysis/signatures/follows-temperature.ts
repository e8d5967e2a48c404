import { theilSen } from '../statistics'
import { legScales } from './leg-scales'
import type { SignatureFinding, SignatureInput } from './types'

const FEWEST_LEGS = 15
const LEAST_SPAN_C = 5
/** Per degree, in the logarithm: under this the leak follows nothing. */
const FOLLOWS = 0.02

/**
 * Does the leak follow the temperature by the probe (engine space or bilge)? Then a hose or clamp there. Fewer
 * than 15 legs with air, or air that moved less than 5 °C: not enough.
 */
export function followsTemperature(input: SignatureInput): SignatureFinding {
  const signature = 'follows-temperature' as const
  const points = legScales(input.legs, input.standardPressurePa).flatMap(({ meanAirC, logScale }) =>
    meanAirC === null ? [] : [{ x: meanAirC, y: logScale }],
  )
  const span =
    points.length === 0 ? 0 : Math.max(...points.map((p) => p.x)) - Math.min(...points.map((p) => p.x))
  if (points.length < FEWEST_LEGS || span < LEAST_SPAN_C) {
    return { signature, enough: false, missing: `${FEWEST_LEGS} holds over ${LEAST_SPAN_C} °C` }
  }
  const trend = theilSen(points)
  if (trend === null || trend.low === null || trend.high === null)
    return { signature, enough: true, suspects: [] }
  const follows = trend.low > FOLLOWS || trend.high < -FOLLOWS
  if (!follows) return { signature, enough: true, suspects: [] }
  const percent = Math.round(100 * (Math.exp(trend.slope) - 1))
  const basis = `the leak changes by ${percent} % a degree at the probe, over ${span.toFixed(0)} °C`
  return {
    signature,
    enough: true,
    suspects: [
      {
        family: 'hose-or-clamp',
        strength: 2.5,
        basis,
        overturnedBy: 'the same rate hot and cold with that hose plugged off',
      },
    ],
  }
}
