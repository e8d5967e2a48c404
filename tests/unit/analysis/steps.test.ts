import { describe, expect, test } from 'vitest'
import { findSteps, type LegRate } from '@/lib/analysis/steps'
import { normalDraw, seededRandom } from '@/lib/analysis/statistics'

const HOUR_MS = 3_600_000

/** Legs of two hours end to end, of the rates given, read to `noise` of them. */
function legsOf(rates: readonly number[], noise = 0.03, seed = 1): LegRate[] {
  const random = seededRandom(seed)
  return rates.map((rate, index) => ({
    startedAt: index * 2 * HOUR_MS,
    endedAt: (index + 1) * 2 * HOUR_MS - 60_000,
    paPerHour: rate * (1 + noise * normalDraw(random)),
    sigmaPaPerHour: Math.max(0.5, Math.abs(noise * rate)),
  }))
}
const level = (rate: number, count: number) => Array.from({ length: count }, () => rate)

describe('steps', () => {
  test('one, between the last old hold and the first new one', () => {
    const [step, ...more] = findSteps(legsOf([...level(400, 30), ...level(1500, 12)]))
    expect(more).toEqual([])
    expect(step?.fromPaPerHour ?? 0).toBeCloseTo(400, -1.5)
    expect(step?.toPaPerHour ?? 0).toBeCloseTo(1500, -2)
    expect(step?.between[0]).toBeLessThanOrEqual(60 * HOUR_MS)
    expect(step?.between[1]).toBeGreaterThanOrEqual(60 * HOUR_MS)
    expect((step?.between[1] ?? 0) - (step?.between[0] ?? 0)).toBeLessThan(2 * HOUR_MS)
    expect(step?.strength ?? 0).toBeGreaterThan(5)
  })

  test('a hold that is neither old nor new holds it', () => {
    const [step] = findSteps(legsOf([...level(400, 20), 900, ...level(1500, 20)]))
    expect(step?.between[0]).toBeGreaterThanOrEqual(40 * HOUR_MS)
    expect(step?.between[1]).toBeLessThanOrEqual(42 * HOUR_MS)
  })

  test('two: a leak that came and was cured', () => {
    const steps = findSteps(legsOf([...level(400, 20), ...level(1200, 15), ...level(420, 20)]))
    expect(steps).toHaveLength(2)
    expect((steps[0]?.toPaPerHour ?? 0) / (steps[1]?.fromPaPerHour ?? 1)).toBeCloseTo(1, 1)
  })

  test('a leak that grew and was cured: from where it had come to', () => {
    const growing = Array.from({ length: 60 }, (_, index) => 400 * Math.pow(2, index / 30))
    const steps = findSteps(legsOf([...growing, ...level(400, 30)]))
    expect(steps).toHaveLength(1)
    expect(steps[0]?.fromPaPerHour ?? 0).toBeGreaterThan(1300)
    expect((steps[0]?.toPaPerHour ?? 0) / 400).toBeCloseTo(1, 1)
  })

  test('two new holds are enough, one is not', () => {
    expect(findSteps(legsOf([...level(400, 30), ...level(1200, 2)]))).toHaveLength(1)
    expect(findSteps(legsOf([...level(400, 30), 1200]))).toEqual([])
  })

  test('one odd hold is no step', () => {
    expect(findSteps(legsOf([...level(400, 15), 2500, ...level(400, 15)]))).toEqual([])
  })
})

describe('no step', () => {
  test('a leak that grows slowly is a trend', () => {
    const rates = Array.from({ length: 150 }, (_, index) => 400 * Math.pow(2, index / 100))
    expect(findSteps(legsOf(rates))).toEqual([])
  })

  test('warm days and cold nights', () => {
    const rates = Array.from(
      { length: 120 },
      (_, index) => 500 * (1 + 0.12 * Math.sin((index * Math.PI) / 6)),
    )
    expect(findSteps(legsOf(rates))).toEqual([])
  })

  test('a tight boat, whose legs read about nought', () => {
    expect(findSteps(legsOf(level(0, 40)))).toEqual([])
    const random = seededRandom(4)
    const noise = legsOf(level(0, 40)).map((leg) => ({
      ...leg,
      paPerHour: 20 * normalDraw(random),
      sigmaPaPerHour: 20,
    }))
    expect(findSteps(noise)).toEqual([])
  })

  test('nothing, too few, NaN; order and the input itself do not matter', () => {
    expect(findSteps([])).toEqual([])
    expect(findSteps(legsOf([1, 1, 9]))).toEqual([])
    const legs = legsOf([...level(400, 20), ...level(1500, 20)])
    const spoilt = [
      ...legs,
      { ...(legs[0] ?? { startedAt: 0, endedAt: 1, sigmaPaPerHour: 1 }), paPerHour: NaN },
    ]
    const frozen = Object.freeze(spoilt.reverse().map((leg) => Object.freeze(leg)))
    expect(findSteps(frozen)).toEqual(findSteps(legs))
  })
})
