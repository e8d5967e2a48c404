import { MS_PER_DAY, MS_PER_SECOND } from './constants'
import { areaForFlow, conductanceForFlow, type LeakLaw } from './leak-flow'

/** A stretch of true time, epoch ms, half-open. */
export type Span = { from: number; to: number }
export const inSpans = (spans: readonly Span[], at: number): boolean =>
  spans.some((span) => at >= span.from && at < span.to)

export type LeakSpec = {
  /** Where it is, a part's key such as `head-1`, `hose-1`, `tank`, `pump`. */
  part: string
  kind: 'orifice' | 'laminar'
  /** pV flow at 9 inHg of vacuum, 20 °C and standard pressure, Pa·m³/s. */
  flowPaM3PerS: number
  /** Not there before this instant. */
  onsetAt?: number
  /** Doubles in so many days from `growsFrom` (default: its onset), at most `growthLimit`-fold (default 100). */
  doublingDays?: number
  growsFrom?: number
  growthLimit?: number
  /** Multiplied by `factor` from each instant on. */
  steps?: readonly { at: number; factor: number }[]
  /** Open only within these. */
  openSpans?: readonly Span[]
  /** A repair: from then on only `curedTo` (default 0) of it is left. */
  curedAt?: number
  curedTo?: number
  /** A bowl seal: a flush of the part's head, or a cup of water in it, wets it. */
  wetting?: { wetShare: number; wetSeconds: number; dryingSeconds: number }
  /** Seats differently after each pump run: standard deviation of the logarithm of its flow. */
  reseatsAtRun?: number
  /** Seats differently after each flush of the part's head. */
  reseatsAtFlush?: number
}

/** What history has made of a leak: its seat, and when and for how long it was wetted. */
export type LeakCondition = { seat: number; wettedAt: number; wetSeconds: number }
export const freshCondition = (): LeakCondition => ({ seat: 1, wettedAt: -1e15, wetSeconds: 0 })

/** Share of a wetted seal's dry flow that passes now. */
function drynessAt(leak: LeakSpec, condition: LeakCondition, at: number): number {
  if (!leak.wetting) return 1
  const drySeconds = (at - condition.wettedAt) / MS_PER_SECOND - condition.wetSeconds
  if (drySeconds <= 0) return leak.wetting.wetShare
  return 1 - (1 - leak.wetting.wetShare) * Math.exp(-drySeconds / leak.wetting.dryingSeconds)
}

/** The leak's flow at an instant as a multiple of its stated size. */
export function leakFactorAt(leak: LeakSpec, condition: LeakCondition, at: number): number {
  if (leak.onsetAt !== undefined && at < leak.onsetAt) return 0
  if (leak.openSpans && !inSpans(leak.openSpans, at)) return 0
  let factor = condition.seat * drynessAt(leak, condition, at)
  const growsFrom = leak.growsFrom ?? leak.onsetAt
  if (leak.doublingDays !== undefined && growsFrom !== undefined && at > growsFrom) {
    factor *= Math.min(leak.growthLimit ?? 100, 2 ** ((at - growsFrom) / MS_PER_DAY / leak.doublingDays))
  }
  for (const step of leak.steps ?? []) if (at >= step.at) factor *= step.factor
  if (leak.curedAt !== undefined && at >= leak.curedAt) factor *= leak.curedTo ?? 0
  return factor
}

/** Leaks sized once, summed to the two coefficients at any instant. */
export function leakLawOf(leaks: readonly LeakSpec[]) {
  const sized = leaks.map((leak) => ({
    leak,
    size: leak.kind === 'orifice' ? areaForFlow(leak.flowPaM3PerS) : conductanceForFlow(leak.flowPaM3PerS),
  }))
  return (conditions: readonly LeakCondition[], at: number): LeakLaw => {
    let areaM2 = 0
    let conductance = 0
    sized.forEach(({ leak, size }, index) => {
      const condition = conditions[index]
      const amount = condition ? size * leakFactorAt(leak, condition, at) : 0
      if (leak.kind === 'orifice') areaM2 += amount
      else conductance += amount
    })
    return { areaM2, conductance }
  }
}

/** Instants at which a leak changes by a jump, so that no step straddles one. */
export const leakEdges = (leak: LeakSpec): number[] =>
  [
    leak.onsetAt,
    leak.growsFrom,
    leak.curedAt,
    ...(leak.steps ?? []).map((step) => step.at),
    ...(leak.openSpans ?? []).flatMap((span) => [span.from, span.to]),
  ].filter((at) => at !== undefined)
