import { GAUGE_RESOLUTION_PA } from '@/lib/analysis/leak-down'
import { normalCdf } from '@/lib/analysis/statistics'
import { groupBySets } from './groups'
import { TOLD_APART, waitSeconds } from './minutes-needed'
import { type Reading, volumeOf } from './readings'
import { flowScale } from './shares'
import type { IsolationPart, NextTest, PossibleTest, Share, Suspect } from './types'
import { reasonFor, SECOND_LEAK, WHOLE_FIRST, WHOLE_LONGER } from './words'

/** The likeliest part (or parts that no test separates) is named from here on. */
const DECIDED = 0.98
/** Under this share of the flow for the one suspected, and surely under that, a second leak is looked for. */
const EXPLAINED = 0.7
const EXPLAINED_AT_MOST = 0.9
/** A flow is known when its interval is narrower than this share of the boat's. */
const KNOWN_WITHIN = 0.25
/** A test is not made again once it tells this share of the boat's flow from nought. */
const PRECISE = 1 / 6
/** Share of the boat's flow to be told from nought where a second leak has to be measured. */
const TOLD_FOR_SECOND = 1 / 10
/** What every test costs besides: breaker off and on, draw-down, settling, wiping up (judged). */
const ROUND_MINUTES = 15
const WHOLE_MINUTES = 2
const LONGEST_WHOLE_SECONDS = 8 * 3600

export type NextTestState = {
  parts: readonly IsolationPart[]
  readings: readonly Reading[]
  possible: readonly PossibleTest[]
  suspects: readonly Suspect[]
  shares: readonly Share[]
  /** Sets of tests that contradict others and may be made again. */
  repeatable: ReadonlySet<Reading>
  gaugeResolutionPa?: number
}

/** Parts that no test, made or possible, separates. */
export function inseparableGroups(state: Pick<NextTestState, 'parts' | 'readings' | 'possible'>): string[][] {
  const sets = [
    ...state.readings.map((reading) => reading.keys),
    ...state.possible.map((test) => new Set(test.parts)),
  ]
  return groupBySets(
    state.parts.map((part) => part.key),
    sets,
  )
}

/**
 * The test that is expected to say most per minute, or null when the leak is found (one suspect of at least
 * 98 % that also carries the flow) or nothing that can be done says more.
 */
export function chooseNextTest(state: NextTestState): NextTest | null {
  if (state.readings.length === 0) return wholeBoat(state, WHOLE_FIRST, 0)
  const flow = flowScale(state.readings)
  if (state.readings.every((reading) => reading.flow < 2 * reading.sigma)) return longerWhole(state)
  const search = searchWeights(state)
  if (search === null) return null
  const candidates = state.possible
    .filter((test) => !isDone(test, state, flow))
    .map((test) => scoreTest(test, search, state, flow))
    .filter((scored) => scored !== null)
    .filter((scored) => scored.bits > 0.01)
    .sort((a, b) => b.bits / (b.test.minutes + ROUND_MINUTES) - a.bits / (a.test.minutes + ROUND_MINUTES))
  const best = candidates[0]
  if (best === undefined) return null
  const why = reasonFor(best.test, best.likelyIn, best.suspectsIn, best.suspectsOut, state.parts)
  return { ...best.test, why: search.second ? SECOND_LEAK + why : why }
}

/** How likely each part is what is still looked for, the one leak or what it does not explain. */
type Search = { weights: Map<string, number>; second: boolean }

/** Null when nothing is looked for any more. */
function searchWeights(state: NextTestState): Search | null {
  const groups = inseparableGroups(state)
  const sum = (group: readonly string[], of: (key: string) => number) =>
    group.reduce((total, key) => total + of(key), 0)
  const probabilities = new Map(state.suspects.map((suspect) => [suspect.key, suspect.probability]))
  const shares = new Map(state.shares.map((share) => [share.key, share]))
  const ranked = groups
    .map((group) => ({ group, probability: sum(group, (key) => probabilities.get(key) ?? 0) }))
    .sort((a, b) => b.probability - a.probability)
  const top = ranked[0]
  if (top === undefined) return null
  if (top.probability < DECIDED) return { weights: probabilities, second: false }
  const scale = flowScale(state.readings)
  const explained = sum(top.group, (key) => shares.get(key)?.share ?? 0)
  const most = Math.max(...top.group.map((key) => shares.get(key)?.high ?? Infinity))
  if (explained >= EXPLAINED || most > EXPLAINED_AT_MOST * scale) return null
  const open = state.shares.filter((share) => (share.high ?? Infinity) - share.low > KNOWN_WITHIN * scale)
  const total = open.reduce((all, share) => all + share.flowPaM3PerS, 0)
  if (!(total > 0)) return null
  return { weights: new Map(open.map((share) => [share.key, share.flowPaM3PerS / total])), second: true }
}

function scoreTest(
  test: PossibleTest,
  { weights, second }: Search,
  state: NextTestState,
  flow: number,
): { test: NextTest; bits: number; likelyIn: number; suspectsIn: string[]; suspectsOut: string[] } | null {
  const timed = timeTest(test, state, flow, second ? TOLD_FOR_SECOND : TOLD_APART)
  if (timed === null) return null
  const keys = new Set(test.parts)
  const likely = [...weights].filter(([, weight]) => weight > 0.01).sort((a, b) => b[1] - a[1])
  const likelyIn = [...weights].reduce((sum, [key, weight]) => (keys.has(key) ? sum + weight : sum), 0)
  const mistaken = normalCdf(-timed.separation / 2)
  const leaks = likelyIn * (1 - mistaken) + (1 - likelyIn) * mistaken
  return {
    test: timed.test,
    bits: entropyBits(leaks) - entropyBits(mistaken),
    likelyIn,
    suspectsIn: likely.map(([key]) => key).filter((key) => keys.has(key)),
    suspectsOut: likely.map(([key]) => key).filter((key) => !keys.has(key)),
  }
}

/** Minutes of a test, and how many standard errors part a leak in it from none. */
function timeTest(
  test: PossibleTest,
  state: NextTestState,
  flow: number,
  toldApart: number,
): { test: NextTest; separation: number } | null {
  const volume = state.parts.reduce(
    (sum, part) => (test.parts.includes(part.key) ? sum + part.volumeM3 : sum),
    0,
  )
  if (!(volume > 0)) return null
  const resolutionPa = handResolutionPa(state)
  const seconds = waitSeconds(volume, resolutionPa, flow, toldApart)
  const waitMinutes = Math.max(1, Math.ceil(seconds / 60))
  const sigma = (volume * resolutionPa) / Math.sqrt(6) / seconds
  return {
    test: { parts: [...test.parts], why: '', minutes: Math.ceil(test.minutes + waitMinutes), waitMinutes },
    separation: flow / sigma,
  }
}

/** What the gauge of the next test can be read to: said, else the coarsest used by hand, else a digital one. */
function handResolutionPa(state: NextTestState): number {
  if (state.gaugeResolutionPa !== undefined) return state.gaugeResolutionPa
  const byHand = state.readings.filter((reading) => reading.keys.size < state.parts.length)
  if (byHand.length > 0) return Math.max(...byHand.map((reading) => reading.resolutionPa))
  return Math.max(GAUGE_RESOLUTION_PA.digital, ...state.readings.map((reading) => reading.resolutionPa))
}

function isDone(test: PossibleTest, state: NextTestState, flow: number): boolean {
  const same = state.readings.filter(
    (reading) =>
      reading.keys.size === new Set(test.parts).size && test.parts.every((key) => reading.keys.has(key)),
  )
  return same.some(
    (reading) => !state.repeatable.has(reading) && (reading.isBound || reading.sigma <= PRECISE * flow),
  )
}

function wholeBoat(state: NextTestState, why: string, leastSeconds: number): NextTest | null {
  const keys = state.parts.map((part) => part.key)
  if (keys.length === 0) return null
  const resolutionPa =
    state.readings[0]?.resolutionPa ?? state.gaugeResolutionPa ?? GAUGE_RESOLUTION_PA.digital
  // Before anything is known, a boat right at three hours' hold with a differential of 1.8 inHg.
  const volume = volumeOf(state.parts, keys)
  const guess = (volume * 18 * GAUGE_RESOLUTION_PA.digital) / (3 * 3600)
  const waitMinutes = Math.ceil(Math.max(leastSeconds, waitSeconds(volume, resolutionPa, guess)) / 60)
  return { parts: keys, why, minutes: WHOLE_MINUTES + waitMinutes, waitMinutes }
}

function longerWhole(state: NextTestState): NextTest | null {
  const longest = Math.max(...state.readings.map((reading) => reading.seconds))
  return longest >= LONGEST_WHOLE_SECONDS
    ? null
    : wholeBoat(state, WHOLE_LONGER, Math.min(LONGEST_WHOLE_SECONDS, 4 * longest))
}

function entropyBits(p: number): number {
  return p <= 0 || p >= 1 ? 0 : -(p * Math.log2(p) + (1 - p) * Math.log2(1 - p))
}
