import { describe, expect, it } from 'vitest'
import { randomBoat, type RandomBoatKind } from '@/simulator/boat'
import { f1, matchFlushes, matchRuns, quantile, simulateAndDerive } from './fold-scoring'

const FROM = Date.UTC(2026, 5, 1)
const BOATS = 12
const DAYS = 4

interface Score {
  seed: number
  truthRuns: number
  f1: number
  pairs: number
  rightTriggers: number
  flushes: { found: number; missed: number; extra: number }
}

/**
 * Derives each boat and compares with what really happened. A pump edge counts within 2 s, or within what the
 * row itself says where a rhythm's sample fell on the very instant of the edge; turning points of the vacuum
 * within one interval and a fifth.
 */
function score(kind: Partial<RandomBoatKind>): Score[] {
  return Array.from({ length: BOATS }, (_, i) => {
    const seed = 101 + i
    const spec = randomBoat(seed, kind)
    const { truth, derived } = simulateAndDerive(spec, FROM, DAYS)
    const intervalMs = spec.logger.intervalSeconds * 1000
    const tolerance = kind.logger === 'vacuum-only' ? 1.2 * intervalMs : 2000
    const matched = matchRuns(truth, derived, tolerance, tolerance)
    const { found, missed, extra } = matchFlushes(truth, derived, intervalMs + 3000)
    return {
      seed,
      truthRuns: truth.runs.length,
      f1: f1(matched.pairs.length, matched.missed.length, matched.extra.length),
      pairs: matched.pairs.length,
      rightTriggers: matched.pairs.filter((pair) => pair.run.trigger === pair.truth.trigger).length,
      flushes: { found, missed: missed.length, extra: extra.length },
    }
  })
}

function summary(name: string, scores: readonly Score[]) {
  const sum = (pick: (each: Score) => number): number => scores.reduce((all, each) => all + pick(each), 0)
  const f1s = scores.map((each) => each.f1)
  const found = sum((each) => each.flushes.found)
  const result = {
    boats: scores.length,
    runs: sum((each) => each.truthRuns),
    f1: { least: Math.min(...f1s), median: quantile(f1s, 0.5) },
    triggersRight: sum((each) => each.rightTriggers) / sum((each) => each.pairs),
    flushRecall: found / (found + sum((each) => each.flushes.missed)),
    flushPrecision: found / (found + sum((each) => each.flushes.extra)),
  }
  console.log(name, JSON.stringify(result))
  return result
}

describe('runs, triggers and flushes against what really happened', () => {
  it.each([
    ['pump and vacuum, each 15 s', {}, 0.995],
    ['pump and vacuum, each 60 s', { intervalSeconds: 60 }, 0.99],
    ['a coarse gauge, each 60 s', { intervalSeconds: 60, coarse: true }, 0.99],
    ['seals that dry and valves that seat anew, each 60 s', { intervalSeconds: 60, changing: true }, 0.99],
  ])('%s', (name, kind, triggersAtLeast) => {
    const result = summary(name, score(kind))
    expect(result.boats).toBe(BOATS)
    expect(result.f1.least).toBeGreaterThanOrEqual(0.98)
    expect(result.f1.median).toBe(1)
    expect(result.triggersRight).toBeGreaterThanOrEqual(triggersAtLeast)
    expect(result.flushRecall).toBeGreaterThanOrEqual(0.985)
    expect(result.flushPrecision).toBeGreaterThanOrEqual(0.985)
  })

  it.each([
    ['vacuum alone, each 20 s', { intervalSeconds: 20 }],
    ['vacuum alone, a coarse gauge, each 20 s', { intervalSeconds: 20, coarse: true }],
  ])('%s', (name, kind) => {
    const result = summary(name, score({ ...kind, logger: 'vacuum-only' }))
    expect(result.boats).toBe(BOATS)
    expect(result.f1.median).toBeGreaterThanOrEqual(0.995)
    expect(result.f1.least).toBeGreaterThanOrEqual(0.93)
    expect(result.triggersRight).toBeGreaterThanOrEqual(0.985)
    expect(result.flushRecall).toBeGreaterThanOrEqual(0.97)
    expect(result.flushPrecision).toBeGreaterThanOrEqual(0.97)
  })

  it('vacuum alone, each 60 s: misses only what hides between two samples', () => {
    const result = summary('vacuum alone, each 60 s', score({ logger: 'vacuum-only', intervalSeconds: 60 }))
    expect(result.f1.median).toBeGreaterThanOrEqual(0.95)
    expect(result.triggersRight).toBeGreaterThanOrEqual(0.95)
  })

  it('pump alone: every run, and triggers only where the length tells', () => {
    const scores = Array.from({ length: BOATS }, (_, i) => {
      const spec = randomBoat(101 + i, { logger: 'pump-only', intervalSeconds: 60 })
      const { truth, derived } = simulateAndDerive(spec, FROM, DAYS)
      const { pairs, missed, extra } = matchRuns(truth, derived, 2000, 2000)
      const told = pairs.filter((pair) => pair.run.trigger !== 'unknown')
      return {
        f1: f1(pairs.length, missed.length, extra.length),
        told: told.length,
        right: told.filter((pair) => pair.run.trigger === pair.truth.trigger).length,
      }
    })
    const told = scores.reduce((sum, each) => sum + each.told, 0)
    const right = scores.reduce((sum, each) => sum + each.right, 0) / told
    console.log('pump alone', JSON.stringify({ told, right, f1: Math.min(...scores.map((each) => each.f1)) }))
    expect(scores).toHaveLength(BOATS)
    expect(Math.min(...scores.map((each) => each.f1))).toBeGreaterThanOrEqual(0.98)
    expect(told).toBeGreaterThan(500)
    expect(right).toBeGreaterThanOrEqual(0.95)
  })
})

describe("a leg's own rate against the leak", () => {
  it('is within a few per cent over long legs, whatever the weather', () => {
    const errors: number[] = []
    let covered = 0
    let boats = 0
    for (let seed = 201; seed < 201 + BOATS; seed += 1) {
      const spec = randomBoat(seed, { intervalSeconds: 30, holdSeconds: 5 * 3600 })
      const { truth, derived } = simulateAndDerive(spec, FROM, DAYS)
      const long = derived.legs.filter((leg) => leg.endedAt - leg.startedAt > 2 * 3_600_000)
      if (long.length > 0) boats += 1
      for (const leg of long) {
        const { vacuumPa } = leg.bins
        const middle = vacuumPa[vacuumPa.length >> 1] ?? 0
        const real = truth.leakPaPerHour(leg.startedAt, middle)
        if (leg.rate === null) continue
        errors.push(Math.abs(leg.rate.paPerHour / real - 1))
        if (leg.rate.low <= real && real <= leg.rate.high) covered += 1
      }
    }
    const result = {
      legs: errors.length,
      median: quantile(errors, 0.5),
      p95: quantile(errors, 0.95),
      covered: covered / errors.length,
    }
    console.log('legs of two hours and more', JSON.stringify(result))
    expect(boats).toBeGreaterThanOrEqual(BOATS - 2)
    expect(result.median).toBeLessThan(0.06)
    expect(result.covered).toBeGreaterThanOrEqual(0.85)
  })
})
