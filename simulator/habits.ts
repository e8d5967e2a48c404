import { hashUniform, poissonOf } from '@/simulator/random'
import { MS_PER_HOUR, MS_PER_SECOND } from '@/simulator/physics/constants'
import { inSpans, type Span } from '@/simulator/physics/leaks'

export type HeadSpec = {
  key: string
  /** How much of the boat's use is this one's. */
  weight: number
  /** Free air that one flush lets in at 9 inHg, litres, and the liquid that follows it. */
  airLitres: number
  waterLitres: number
}

export type HabitSpec = {
  heads: readonly HeadSpec[]
  /** Flushes an hour in each hour of the local day while people are aboard: 24 figures. */
  flushesByHour: readonly number[]
  /** Short openings of a bowl valve, a day. */
  tapsPerDay: number
  /** A flush's air scatters by this standard deviation of its logarithm. */
  airScatter: number
  flushSeconds: number
  aboard: 'always' | 'never' | readonly Span[]
  /** Nobody aboard, whatever `aboard` says. */
  away: readonly Span[]
  /** Flushes at given instants besides those of habit. */
  extraFlushes: readonly { at: number; head: string }[]
  /** A cup of water poured into a bowl after the last flush. */
  cups: readonly { at: number; head: string }[]
}

export type OpeningEvent = { at: number; kind: 'flush' | 'tap' | 'cup'; headIndex: number; airFactor: number }

/** Two people: up at 6, out by 9, back for the evening, rarely up at night. About 13 flushes a day. */
export const TWO_ABOARD: readonly number[] = [
  0.06, 0.04, 0.05, 0.06, 0.08, 0.25, 0.8, 1.2, 1.0, 0.6, 0.4, 0.4, 0.6, 0.6, 0.4, 0.4, 0.5, 0.7, 0.9, 0.9,
  0.9, 1.0, 0.9, 0.35,
]

/** Evenings and nights only, as of people who work ashore. */
export const EVENINGS: readonly number[] = [
  0.15, 0.05, 0.05, 0.05, 0.08, 0.3, 1.0, 1.1, 0.3, 0, 0, 0, 0, 0, 0, 0, 0.1, 0.5, 0.9, 1.0, 1.0, 1.1, 1.2,
  0.6,
]

const SPACING_MS = 40 * MS_PER_SECOND

/** The heads' events of one local hour: Poisson in number, kept 40 s apart and off the hour's end. */
function eventsOfHour(
  habits: HabitSpec,
  seed: number,
  offsetSeconds: number,
  localHour: number,
): OpeningEvent[] {
  const startMs = localHour * MS_PER_HOUR - offsetSeconds * MS_PER_SECOND
  const expected = habits.flushesByHour[((localHour % 24) + 24) % 24] ?? 0
  const flushCount = poissonOf(expected, hashUniform(seed, 31, localHour))
  const perDay = habits.flushesByHour.reduce((sum, each) => sum + each, 0)
  const tapMean = perDay > 0 ? (habits.tapsPerDay * expected) / perDay : 0
  const tapCount = tapMean > 0 ? poissonOf(tapMean, hashUniform(seed, 32, localHour)) : 0
  const totalWeight = habits.heads.reduce((sum, head) => sum + head.weight, 0)
  const events: OpeningEvent[] = []
  for (let i = 0; i < flushCount + tapCount; i++) {
    const kind = i < flushCount ? 'flush' : 'tap'
    let pick = hashUniform(seed, 33, localHour, i) * totalWeight
    let headIndex = 0
    habits.heads.forEach((head, index) => {
      if (pick > 0) headIndex = index
      pick -= head.weight
    })
    const scatter = hashUniform(seed, 34, localHour, i) + hashUniform(seed, 35, localHour, i) - 1
    const tapShare = 0.05 + 0.12 * hashUniform(seed, 37, localHour, i)
    events.push({
      at: startMs + Math.round(hashUniform(seed, 36, localHour, i) * (MS_PER_HOUR - SPACING_MS)),
      kind,
      headIndex,
      // A triangle of ±1 has a standard deviation of 1/√6.
      airFactor: Math.exp(habits.airScatter * Math.sqrt(6) * scatter) * (kind === 'tap' ? tapShare : 1),
    })
  }
  events.sort((a, b) => a.at - b.at)
  return events.filter((event, index) => event.at - (events[index - 1]?.at ?? -1e15) >= SPACING_MS)
}

/** Whether anybody is aboard at an instant. */
export function aboardAt(habits: HabitSpec, at: number): boolean {
  if (habits.aboard === 'never' || inSpans(habits.away, at)) return false
  return habits.aboard === 'always' || inSpans(habits.aboard, at)
}

/** A function that gives the first event after an instant and before another, or null. */
export function openingEvents(habits: HabitSpec, seed: number, offsetSeconds: number) {
  const given: OpeningEvent[] = [
    ...habits.extraFlushes.map((each) => ({ ...each, kind: 'flush' as const })),
    ...habits.cups.map((each) => ({ ...each, kind: 'cup' as const })),
  ]
    .map(({ at, head, kind }) => ({
      at,
      kind,
      headIndex: Math.max(
        0,
        habits.heads.findIndex((each) => each.key === head),
      ),
      airFactor: 1,
    }))
    .sort((a, b) => a.at - b.at)
  let cachedHour = Number.NaN
  let cached: OpeningEvent[] = []
  const ofHour = (hour: number): OpeningEvent[] => {
    if (hour !== cachedHour) {
      cachedHour = hour
      cached = eventsOfHour(habits, seed, offsetSeconds, hour)
    }
    return cached
  }
  return (afterMs: number, beforeMs: number): OpeningEvent | null => {
    const firstGiven = given.find((event) => event.at > afterMs && event.at < beforeMs) ?? null
    const end = firstGiven?.at ?? beforeMs
    const lastHour = Math.floor((end + offsetSeconds * MS_PER_SECOND) / MS_PER_HOUR)
    for (
      let hour = Math.floor((afterMs + offsetSeconds * MS_PER_SECOND) / MS_PER_HOUR);
      hour <= lastHour;
      hour++
    ) {
      for (const event of ofHour(hour)) {
        if (event.at > afterMs && event.at < end && aboardAt(habits, event.at)) return event
      }
    }
    return firstGiven
  }
}
