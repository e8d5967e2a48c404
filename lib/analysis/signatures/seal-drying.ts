import type { LegRow } from '../fold/types'
import { theilSen } from '../statistics'
import { legScales } from './leg-scales'
import type { SignatureFinding, SignatureInput } from './types'

const FEWEST_LEGS = 8
/** A seal dries within this long after a flush wetted it. */
const WETTED_SECONDS = 1_200
const DOUBLED = 2

/**
 * A bowl seal drying: within the first hold after a flush the rate more than doubles (a knee that later holds of
 * the night do not show), or the rate rises with the hours since the last flush. Fewer than 8 legs after flushes
 * or without: not enough.
 */
export function sealDrying(input: SignatureInput): SignatureFinding {
  const signature = 'seal-drying' as const
  const legs = input.legs.filter((leg) => !leg.setAside && leg.sinceFlushSeconds !== null)
  const ratios = (wanted: (leg: LegRow) => boolean) =>
    legs.filter(wanted).flatMap((leg) => lateOverEarly(leg) ?? [])
  const wet = ratios((leg) => (leg.sinceFlushSeconds ?? Infinity) < WETTED_SECONDS)
  const dry = ratios((leg) => (leg.sinceFlushSeconds ?? 0) > 3 * WETTED_SECONDS)
  const knees = wet.filter((ratio) => ratio > DOUBLED).length
  const others = dry.filter((ratio) => ratio > DOUBLED).length
  const rising = risesSinceFlush(input)
  if (wet.length < FEWEST_LEGS && rising === null) {
    return { signature, enough: false, missing: `${FEWEST_LEGS} holds of over half an hour after a flush` }
  }
  const overturnedBy = 'a cup of water in each bowl that changes nothing'
  const isKnee = knees >= 3 && knees > 0.4 * wet.length && others <= 0.15 * Math.max(1, dry.length)
  if (isKnee) {
    const basis = `the leak more than doubles within the first hold after a flush, ${knees} of ${wet.length}; later ${others} of ${dry.length}`
    return { signature, enough: true, suspects: [{ family: 'bowl-seal', strength: 5, basis, overturnedBy }] }
  }
  if (rising !== null && rising.doublesInHours !== null) {
    const basis = `the leak grows with the hours since the last flush, twofold in ${rising.doublesInHours.toFixed(1)} h, and a flush resets it`
    return { signature, enough: true, suspects: [{ family: 'bowl-seal', strength: 4, basis, overturnedBy }] }
  }
  return { signature, enough: true, suspects: [] }
}

/** Rate of a leg's last third over that of its first; null where it is short or the first third shows no leak. */
function lateOverEarly({ bins }: LegRow): number | null {
  const size = bins.vacuumPa.length
  const last = bins.offsetSeconds[size - 1] ?? 0
  if (size < 9 || last - (bins.offsetSeconds[0] ?? 0) < 1_800) return null
  const third = Math.floor(size / 3)
  const early = fallPerSecond(bins, 0, third)
  const late = fallPerSecond(bins, size - third, size)
  return early > 0 && late > 0 ? late / early : null
}

function fallPerSecond(bins: LegRow['bins'], from: number, to: number): number {
  const fit = theilSen(
    bins.offsetSeconds.slice(from, to).map((x, i) => ({ x, y: -(bins.vacuumPa[from + i] ?? NaN) })),
  )
  return fit?.slope ?? 0
}

function risesSinceFlush(input: SignatureInput): { doublesInHours: number | null } | null {
  const points = legScales(input.legs, input.standardPressurePa).flatMap(({ leg, logScale }) =>
    leg.sinceFlushSeconds === null || leg.sinceFlushSeconds > 43_200
      ? []
      : [{ x: leg.sinceFlushSeconds / 3600, y: logScale }],
  )
  if (points.length < 2 * FEWEST_LEGS) return null
  const trend = theilSen(points)
  if (trend === null || trend.low === null || !(trend.low > 0.05)) return { doublesInHours: null }
  return { doublesInHours: Math.LN2 / trend.slope }
}
