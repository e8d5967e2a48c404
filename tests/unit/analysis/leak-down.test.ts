import { describe, expect, test } from 'vitest'
import { DEFAULT_HOLD_LIMITS, judgeLeakDown } from '@/lib/analysis/leak-down'
import { inHgToPa, paToInHg } from '@/shared/units'

const fell = (inHg: number, minutes: number, more = {}) =>
  judgeLeakDown({ startPa: inHgToPa(10), endPa: inHgToPa(10 - inHg), seconds: minutes * 60, ...more })

describe('verdict', () => {
  test('right at the limit a digital gauge cannot tell after half an hour', () => {
    const result = fell(0.3, 30)
    expect(result.verdict).toBe('cannot-tell')
    expect(paToInHg(result.paPerHour)).toBeCloseTo(0.6, 9)
    expect(result.holdSeconds).toBeCloseTo(3 * 3600, 3)
    expect(result.moreMinutes).toBeGreaterThan(20)
  })

  test('waiting the minutes it asks for lets it decide', () => {
    for (const rate of [0.1, 0.21, 0.3, 0.55, 0.62, 0.9, 9, 11.5]) {
      let minutes = 10
      let result = fell((rate * minutes) / 60, minutes)
      if (result.moreMinutes !== null) {
        minutes += result.moreMinutes
        result = fell((rate * minutes) / 60, minutes)
      }
      expect(result.verdict, `${rate} inHg/h`).not.toBe('cannot-tell')
    }
  })

  test.each([
    [0, 30, 'tight'],
    [0.2, 30, 'weeping'],
    [0.8, 30, 'leaking'],
    [2, 5, 'short-cycling'],
  ])('%s inHg in %s min with the logger', (inHg, minutes, verdict) => {
    expect(fell(inHg, minutes, { resolutionPa: inHgToPa(0.01) }).verdict).toBe(verdict)
  })

  test('a dial needs longer than a digital gauge', () => {
    const dial = fell(0.1, 15, { resolutionPa: inHgToPa(0.125) }).moreMinutes ?? 0
    expect(dial).toBeGreaterThan(fell(0.1, 15).moreMinutes ?? 0)
  })

  test('a vacuum that rises is weather, and waiting does not help', () => {
    expect(fell(-0.4, 30)).toMatchObject({ verdict: 'cannot-tell', moreMinutes: null, holdSeconds: null })
    // A small rise is.
    expect(fell(-0.05, 30, { resolutionPa: inHgToPa(0.01) }).verdict).toBe('tight')
  })

  test('the differential and the limits are what hold time is judged by', () => {
    const wide = fell(0.3, 30, { resolutionPa: inHgToPa(0.01), differentialPa: inHgToPa(3.6) })
    expect(wide).toMatchObject({ verdict: 'weeping' })
    expect(wide.holdSeconds).toBeCloseTo(6 * 3600, 3)
    const strict = judgeLeakDown(
      { startPa: inHgToPa(10), endPa: inHgToPa(9.8), seconds: 1800, resolutionPa: inHgToPa(0.01) },
      { ...DEFAULT_HOLD_LIMITS, limitSeconds: 5 * 3600 },
    )
    expect(strict.verdict).toBe('leaking')
  })
})

describe('correction', () => {
  test('two degrees of cooling hide half the limit of a 30-minute test', () => {
    const cooled = fell(0.15, 30, { airStartCel: 22, airEndCel: 20 })
    expect(paToInHg(cooled.paPerHour)).toBeCloseTo(0.3, 9)
    // Half of what is between dry and saturated is taken off; the interval covers both.
    expect(paToInHg(cooled.compensatedPaPerHour ?? 0)).toBeGreaterThan(0.57)
    expect(cooled.high - cooled.low).toBeGreaterThan(fell(0.15, 30).high - fell(0.15, 30).low)
    expect(cooled.airMoved).toBe(false)
    expect(fell(0.15, 30, { airStartCel: 23, airEndCel: 20 }).airMoved).toBe(true)
  })

  test('a falling barometer looks like a leak', () => {
    const result = fell(0.3, 30, { barometerStartPa: 101_325, barometerEndPa: 101_325 - inHgToPa(0.3) })
    expect(result.compensatedPaPerHour).toBeCloseTo(0, 6)
    expect(result.corrected).toBe('barometer')
    expect(result.verdict).toBe('tight')
  })

  test('one reading of a channel corrects nothing', () => {
    expect(fell(0.3, 30, { airStartCel: 20 })).toMatchObject({
      compensatedPaPerHour: null,
      corrected: 'none',
    })
    expect(fell(0.3, 30, { barometerEndPa: 101_000 }).compensatedPaPerHour).toBeNull()
  })
})

describe('leak flow and hole', () => {
  test('a 40-litre system at the limit lets in 0.8 L an hour through a hole thinner than a hair', () => {
    const { flowPaM3PerS, holeDiameterM } = fell(0.3, 30, { volumeM3: 0.04 })
    expect(((flowPaM3PerS ?? 0) / 101_325) * 3600 * 1000).toBeCloseTo(0.802, 2)
    expect(holeDiameterM ?? 1).toBeGreaterThan(4e-5)
    expect(holeDiameterM ?? 1).toBeLessThan(5.5e-5)
  })

  test('null without a volume, and without a loss', () => {
    expect(fell(0.3, 30)).toMatchObject({ flowPaM3PerS: null, holeDiameterM: null })
    expect(fell(-0.1, 30, { volumeM3: 0.04 }).holeDiameterM).toBeNull()
  })
})

test.each([[{ startPa: 30_000, endPa: 29_000, seconds: 0 }], [{ startPa: NaN, endPa: 29_000, seconds: 60 }]])(
  'refuses %j',
  (input) => {
    expect(() => judgeLeakDown(input)).toThrow(RangeError)
  },
)
