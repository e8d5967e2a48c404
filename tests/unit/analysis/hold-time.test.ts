import { describe, expect, test } from 'vitest'
import { estimateHoldTime, holdTimeFromLengths, type HoldTimeInput } from '@/lib/analysis/hold-time'
import { seededRandom } from '@/lib/analysis/statistics'
import { AT, DAY_MS, HOUR_MS, hold, INHG, lawOf, leg, run } from './record-rows'

const EMPTY: HoldTimeInput = {
  at: AT,
  runs: [],
  holds: [],
  legs: [],
  open: { run: null, hold: null, leg: null },
  cutOutPa: 10 * INHG,
  settledPa: 10 * INHG,
  cutInPa: 8 * INHG,
  bandDoubt: 0,
  standardPressurePa: 101_325,
  standingVacuum: true,
}

describe('which method applies', () => {
  test('an empty record and an on-demand system say nothing', () => {
    expect(estimateHoldTime(EMPTY)).toBeNull()
    const legs = [leg(AT - 6 * HOUR_MS, 18_000, lawOf(500))]
    expect(estimateHoldTime({ ...EMPTY, legs, standingVacuum: false })).toBeNull()
  })

  test('one flush-free hold a day is enough', () => {
    const found = estimateHoldTime({ ...EMPTY, legs: [leg(AT - 6 * HOUR_MS, 18_000, lawOf(300))] })
    expect(found?.method).toBe('legs')
    expect(Math.abs((found?.seconds ?? 0) / 3600 / ((2 * INHG) / 300) - 1)).toBeLessThan(0.05)
  })

  test('the open leg counts', () => {
    const open = leg(AT - 2 * HOUR_MS, 7200, lawOf(900))
    const found = estimateHoldTime({ ...EMPTY, open: { ...EMPTY.open, leg: open } })
    expect(found?.legs).toBe(1)
  })

  test('holds of a few minutes: (settled top − end) / length, never nothing', () => {
    const holds = Array.from({ length: 12 }, (_, i) =>
      hold(AT - (i + 1) * 400_000, 300, { settledPa: 9.8 * INHG }),
    )
    const found = estimateHoldTime({ ...EMPTY, holds })
    expect(found?.method).toBe('short-holds')
    expect(found?.seconds).toBeCloseTo((300 * 2) / 1.8, 0)
    expect(found?.bound).toBeNull()
  })

  test('two short holds suffice, and short holds without vacuum count by length', () => {
    const bare = { cutOutPa: null, settledPa: null, endPa: null, learnedSettledPa: null }
    const holds = [hold(AT - 900_000, 300, bare), hold(AT - 450_000, 310, bare)]
    const found = estimateHoldTime({ ...EMPTY, holds, cutOutPa: null, cutInPa: null, settledPa: null })
    expect(found?.seconds).toBeCloseTo(305, 0)
    expect(found?.rate).toBeNull()
  })

  test('holds set aside and interrupted ones count in nothing', () => {
    const holds = Array.from({ length: 12 }, (_, i) => hold(AT - (i + 1) * 400_000, 300, { setAside: true }))
    expect(estimateHoldTime({ ...EMPTY, holds })).toBeNull()
    const cut = Array.from({ length: 12 }, (_, i) =>
      hold(AT - (i + 1) * 400_000, 300, { ending: 'interrupted' }),
    )
    expect(estimateHoldTime({ ...EMPTY, holds: cut })).toBeNull()
  })
})

describe('bounds', () => {
  test('a slope lost in noise is a bound under the truth', () => {
    const paPerHour = 40
    const noisy = leg(AT - HOUR_MS, 2700, lawOf(paPerHour), { gaugePa: 34 })
    const random = seededRandom(3)
    noisy.bins.vacuumPa = noisy.bins.vacuumPa.map((pa) => pa + 120 * (random() - 0.5))
    const found = estimateHoldTime({ ...EMPTY, legs: [noisy] })
    expect(found?.bound).toBe('at-least')
    expect(found?.high).toBeNull()
    expect(found?.seconds ?? Infinity).toBeLessThan(1.03 * ((2 * INHG) / paPerHour) * 3600)
  })

  test('an unknown band widens the hold time, not the rate', () => {
    const legs = [leg(AT - 6 * HOUR_MS, 18_000, lawOf(600)), leg(AT - 12 * HOUR_MS, 18_000, lawOf(600))]
    const sure = estimateHoldTime({ ...EMPTY, legs })
    const doubtful = estimateHoldTime({ ...EMPTY, legs, bandDoubt: 0.12 })
    expect(doubtful?.rate).toEqual(sure?.rate)
    expect(doubtful?.high ?? 0).toBeGreaterThan(1.15 * (sure?.high ?? Infinity))
  })
})

describe('lengths alone', () => {
  /** Leak holds of `hours`, cut by flushes at random; leak runs of 40 s, flush runs longer. */
  function pumpOnly(hours: number, flushesPerHour: number, days = 7): HoldTimeInput {
    const random = seededRandom(11)
    const holds: HoldTimeInput['holds'][number][] = []
    const runs: HoldTimeInput['runs'][number][] = []
    const bare = { ending: 'unknown' as const, cutOutPa: null, settledPa: null, endPa: null }
    let at = AT - days * DAY_MS
    while (at < AT) {
      const whole = hours * 3600 * (1 + 0.04 * (random() - 0.5))
      const cut = (-Math.log(1 - random()) / flushesPerHour) * 3600
      const seconds = Math.min(whole, cut)
      holds.push(hold(at, seconds, bare))
      const runSeconds = cut < whole ? 45 + 40 * random() : 40 + random()
      runs.push(run(at + seconds * 1000, runSeconds, { trigger: 'unknown', vacuumAtStartPa: null }))
      at += (seconds + runSeconds) * 1000
    }
    return { ...EMPTY, holds, runs, cutOutPa: null, cutInPa: null, settledPa: null }
  }

  test.each([0.5, 2, 3.5])('a hold of %s h among flushes', (hours) => {
    const found = holdTimeFromLengths(pumpOnly(hours, 0.35))
    expect(found?.bound).toBeNull()
    expect(Math.abs((found?.seconds ?? 0) / 3600 / hours - 1)).toBeLessThan(0.03)
    expect(found?.holds ?? 0).toBeGreaterThanOrEqual(4)
  })

  test('flushes always first: a bound, not over what was seen', () => {
    const input = pumpOnly(60, 0.5)
    const found = holdTimeFromLengths(input)
    const longest = Math.max(...input.holds.map((one) => one.endedAt - one.startedAt)) / 1000
    expect(found?.bound).toBe('at-least')
    expect(found?.seconds ?? Infinity).toBeLessThan(longest)
    expect(found?.seconds ?? 0).toBeGreaterThan(0.75 * longest)
  })

  test('equal lengths need nothing special; under six holds say nothing', () => {
    const bare = { ending: 'unknown' as const, cutOutPa: null, settledPa: null, endPa: null }
    const holds = Array.from({ length: 20 }, (_, i) => hold(AT - (i + 1) * 2 * HOUR_MS, 7000, bare))
    const found = holdTimeFromLengths({ ...EMPTY, holds })
    expect(Math.abs((found?.seconds ?? 0) / 7000 - 1)).toBeLessThan(0.02)
    expect(holdTimeFromLengths({ ...EMPTY, holds: holds.slice(0, 5) })).toBeNull()
    expect(holdTimeFromLengths({ ...EMPTY, holds: [] })).toBeNull()
  })

  test('lengths that are not finite are left out', () => {
    const input = pumpOnly(2, 0.35)
    const broken = [...input.holds, hold(NaN, 100, { ending: 'unknown' })]
    expect(holdTimeFromLengths({ ...input, holds: broken })?.seconds).toBe(
      holdTimeFromLengths(input)?.seconds,
    )
  })
})
