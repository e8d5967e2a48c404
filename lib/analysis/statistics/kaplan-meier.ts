import { chiSquaredUpper, zOfConfidence } from './distributions'

/** A length of time, ended by the event in question or cut short before it. */
export type Survival = { time: number; event: boolean }
export type SurvivalStep = {
  time: number
  atRisk: number
  events: number
  censored: number
  survival: number
  /** Greenwood's; NaN once nobody is left. */
  standardError: number
  low: number
  high: number
}

/**
 * Kaplan–Meier estimate of the share that lasts beyond each time, with Greenwood's error and the interval
 * on the log scale (as R's `survfit` by default). Censored times at an event's time count as at risk
 * there. Nothing: an empty list; NaN times are left out.
 */
export function kaplanMeier(observations: readonly Survival[], confidence = 0.95): SurvivalStep[] {
  const known = observations.filter((item) => Number.isFinite(item.time)).sort((a, b) => a.time - b.time)
  const z = zOfConfidence(confidence)
  let survival = 1
  let hazardVariance = 0
  return groupByTime(known).map(({ time, events, censored, atRisk }) => {
    survival *= 1 - events / atRisk
    hazardVariance += events === 0 ? 0 : events / (atRisk * (atRisk - events))
    const logError = Math.sqrt(hazardVariance)
    return {
      time,
      atRisk,
      events,
      censored,
      survival,
      standardError: survival > 0 ? survival * logError : NaN,
      low: survival > 0 ? survival * Math.exp(-z * logError) : NaN,
      high: survival > 0 ? Math.min(1, survival * Math.exp(z * logError)) : NaN,
    }
  })
}

function groupByTime(sorted: readonly Survival[]) {
  const groups: { time: number; events: number; censored: number; atRisk: number }[] = []
  sorted.forEach((item, index) => {
    let group = groups.at(-1)
    if (group === undefined || group.time !== item.time) {
      group = { time: item.time, events: 0, censored: 0, atRisk: sorted.length - index }
      groups.push(group)
    }
    if (item.event) group.events += 1
    else group.censored += 1
  })
  return groups
}

/**
 * Time by which half have ended, with its interval: where the curve and its bounds cross one half, the
 * middle of the stretch when it rests on exactly one half. Null where it does not get there.
 */
export function survivalMedian(steps: readonly SurvivalStep[]): {
  median: number | null
  low: number | null
  high: number | null
} {
  return {
    median: crossing(steps, (step) => step.survival),
    low: crossing(steps, (step) => step.low),
    high: crossing(steps, (step) => step.high),
  }
}

function crossing(steps: readonly SurvivalStep[], level: (step: SurvivalStep) => number): number | null {
  const at = steps.findIndex((step) => level(step) <= 0.5 + 1e-12)
  const step = steps[at]
  if (step === undefined) return null
  if (Math.abs(level(step) - 0.5) > 1e-12) return step.time
  const next = steps.slice(at + 1).find((later) => later.events > 0)
  return next === undefined ? step.time : (step.time + next.time) / 2
}

/** Mean time up to the last observed one: the area under the curve. Nothing: null. */
export function restrictedMean(steps: readonly SurvivalStep[]): number | null {
  if (steps.length === 0) return null
  let area = 0
  let from = 0
  let survival = 1
  for (const step of steps) {
    area += survival * (step.time - from)
    from = step.time
    survival = step.survival
  }
  return area
}

export type LogRank = {
  observed: number
  expected: number
  variance: number
  chiSquared: number
  pValue: number
}

/**
 * Log-rank test of whether two groups last alike; `observed` and `expected` are the first group's events.
 * Null where nothing can be told (an empty group, or no events while both are at risk).
 */
export function logRank(first: readonly Survival[], second: readonly Survival[]): LogRank | null {
  const times = [...new Set([...first, ...second].filter((item) => item.event).map((item) => item.time))]
  let observed = 0
  let expected = 0
  let variance = 0
  for (const time of times) {
    const atRisk1 = first.filter((item) => item.time >= time).length
    const atRisk = atRisk1 + second.filter((item) => item.time >= time).length
    const isEvent = (item: Survival) => item.event && item.time === time
    const events1 = first.filter(isEvent).length
    const events = events1 + second.filter(isEvent).length
    observed += events1
    expected += (events * atRisk1) / atRisk
    if (atRisk > 1) {
      variance +=
        (events * atRisk1 * (atRisk - atRisk1) * (atRisk - events)) / (atRisk * atRisk * (atRisk - 1))
    }
  }
  if (!(variance > 0)) return null
  const chiSquared = (observed - expected) ** 2 / variance
  return { observed, expected, variance, chiSquared, pValue: chiSquaredUpper(chiSquared, 1) }
}
