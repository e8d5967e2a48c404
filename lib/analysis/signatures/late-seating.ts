import { PA_PER_INHG } from '@/shared/units'
import { theilSen } from '../statistics'
import type { SignatureFinding, SignatureInput } from './types'

const FEWEST_HOLDS = 20
const FEWEST_DAYS = 7
/** What the gas takes back by itself (judged), and a growth that counts. */
const USUAL_PA = 0.35 * PA_PER_INHG
const GROWTH_PA_PER_WEEK = 0.05 * PA_PER_INHG

/**
 * A fast fall right after the stop, beyond what the gas takes back while it warms and growing over weeks: valves
 * that seat late. Fewer than 20 holds over a week: not enough.
 */
export function lateSeating({ holds }: SignatureInput): SignatureFinding {
  const signature = 'late-seating' as const
  const points = holds.flatMap((hold) =>
    hold.setAside || hold.cutOutPa === null || hold.settledPa === null
      ? []
      : [{ x: hold.startedAt / (7 * 86_400_000), y: hold.cutOutPa - hold.settledPa }],
  )
  const weeks =
    points.length === 0 ? 0 : Math.max(...points.map((p) => p.x)) - Math.min(...points.map((p) => p.x))
  if (points.length < FEWEST_HOLDS || weeks * 7 < FEWEST_DAYS) {
    return { signature, enough: false, missing: `${FEWEST_HOLDS} holds over a week` }
  }
  // A record of months is thinned: the trend needs no more, and its cost is the square of the points.
  const stride = Math.ceil(points.length / 150)
  const trend = theilSen(points.filter((_, index) => index % stride === 0))
  const newest = points.slice(-10).reduce((sum, point) => sum + point.y, 0) / Math.min(10, points.length)
  if (trend === null || trend.low === null || trend.low < GROWTH_PA_PER_WEEK || newest < USUAL_PA) {
    return { signature, enough: true, suspects: [] }
  }
  const inches = (pa: number) => (pa / PA_PER_INHG).toFixed(2)
  const basis = `the fall after a stop grew to ${inches(newest)} inHg, by ${inches(trend.slope)} a week`
  return {
    signature,
    enough: true,
    suspects: [
      { family: 'check-valve', strength: 3, basis, overturnedBy: 'the same fall with the pump plugged off' },
    ],
  }
}
