import { describe, expect, test } from 'vitest'
import { rateTrend } from '@/lib/analysis/trend'
import { normalDraw, seededRandom } from '@/lib/analysis/statistics'

const DAY_MS = 86_400_000
const START = 1_700_000_000_000
const days = (rates: number[]) =>
  Object.freeze(rates.map((paPerHour, index) => ({ at: START + index * DAY_MS, paPerHour })))
const grows = (count: number, doublingDays: number, noise = 0, seed = 1) => {
  const random = seededRandom(seed)
  return days(
    Array.from(
      { length: count },
      (_, day) => 500 * Math.pow(2, day / doublingDays) * Math.exp(noise * normalDraw(random)),
    ),
  )
}

describe('a leak that grows', () => {
  test('doubling time and the day it crosses the limit', () => {
    const trend = rateTrend(grows(21, 20), 2000)
    expect(trend?.doublingDays).toBeCloseTo(20, 6)
    expect(trend?.slopePerDay).toBeCloseTo(Math.LN2 / 20, 9)
    expect(trend?.limitCrossing?.at).toBeCloseTo(START + 40 * DAY_MS, -3)
  })

  test('with weather in it the interval covers the truth nineteen times in twenty', () => {
    const truth = START + 40 * DAY_MS
    let covered = 0
    for (let seed = 1; seed <= 100; seed += 1) {
      const trend = rateTrend(grows(28, 20, 0.12, seed), 2000)
      const crossing = trend?.limitCrossing
      if (crossing && (crossing.low ?? -Infinity) <= truth && truth <= (crossing.high ?? Infinity))
        covered += 1
    }
    expect(covered).toBeGreaterThanOrEqual(90)
  })

  test('crossed within the record: the day it did', () => {
    expect(rateTrend(grows(21, 10), 1000)?.limitCrossing?.at).toBeCloseTo(START + 10 * DAY_MS, -3)
  })

  test('no crossing that could be dated', () => {
    expect(rateTrend(grows(21, 20), 100)?.limitCrossing).toBeNull()
    expect(rateTrend(grows(21, 20), null)?.limitCrossing).toBeNull()
    expect(rateTrend(grows(21, -20), 100)?.limitCrossing).toBeNull()
    expect(rateTrend(grows(21, -20), 100)?.doublingDays).toBeCloseTo(-20, 6)
  })
})

describe('no trend', () => {
  test('steady boats have none', () => {
    let found = 0
    for (let seed = 1; seed <= 200; seed += 1) {
      const trend = rateTrend(grows(28, Infinity, 0.12, seed), 2000)
      if (trend?.isTrend) found += 1
      if (!trend?.isTrend) expect(trend).toMatchObject({ doublingDays: null, limitCrossing: null })
    }
    expect(found).toBeLessThanOrEqual(20)
  })

  test('all days alike', () => {
    expect(rateTrend(days([5, 5, 5, 5, 5, 5]), 10)).toMatchObject({
      slopePerDay: 0,
      isTrend: false,
      pValue: 1,
    })
  })

  test('too few days, or none with a rate above nought', () => {
    expect(rateTrend([], 10)).toBeNull()
    expect(rateTrend(days([1, 2, 3, 4]), 10)).toBeNull()
    expect(rateTrend(days([-1, 0, NaN, 4, 5, 6, 7]), 10)).toBeNull()
  })
})
