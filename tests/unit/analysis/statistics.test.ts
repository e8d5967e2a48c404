import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import * as statistics from '@/lib/analysis/statistics'

const NOTHING = Object.freeze<number[]>([])
const MIXED = Object.freeze([5, NaN, 1, 3, 3, Infinity])
const points = (values: readonly number[]) => Object.freeze(values.map((y, x) => Object.freeze({ x, y })))

describe('nothing, one value, NaN and ties', () => {
  test('quantiles', () => {
    expect(statistics.quantile(NOTHING, 0.5)).toBeNull()
    expect(statistics.quantile([7], 0.9)).toBe(7)
    expect(statistics.median(MIXED)).toBe(3)
    expect(statistics.medianAbsoluteDeviation([2])).toBe(0)
    expect(statistics.medianAbsoluteDeviation(NOTHING)).toBeNull()
  })

  test('moments', () => {
    expect(statistics.mean(MIXED)).toBe(3)
    expect(statistics.mean(NOTHING)).toBeNull()
    expect(statistics.standardDeviation([1])).toBeNull()
    expect(statistics.lagOneAutocorrelation([2, 2, 2])).toBeNull()
  })

  test('Theil–Sen', () => {
    expect(statistics.theilSen(points([]))).toBeNull()
    expect(statistics.theilSen(points([4]))).toBeNull()
    expect(
      statistics.theilSen([
        { x: 1, y: 1 },
        { x: 1, y: 2 },
      ]),
    ).toBeNull()
    const two = statistics.theilSen(points([1, 3]))
    expect(two).toMatchObject({ slope: 2, low: null, high: null })
    expect(statistics.theilSen(points([0, 1, NaN, 3, 4]))?.slope).toBe(1)
  })

  test('Mann–Kendall', () => {
    expect(statistics.mannKendall(points([1, 2]))).toBeNull()
    expect(statistics.mannKendall(points([2, 2, 2, 2]))).toBeNull()
    expect(statistics.mannKendall(points([1, 2, 2, 3]))?.method).toBe('normal')
    expect(statistics.mannKendall(points([1, 2, 3, 4]))?.pValue).toBeCloseTo(1 / 12, 12)
  })

  test('two samples', () => {
    expect(statistics.mannWhitney(NOTHING, [1])).toBeNull()
    expect(statistics.mannWhitney([2, 2], [2, 2])?.pValue).toBe(1)
    expect(statistics.hodgesLehmann([1], NOTHING)).toBeNull()
    expect(statistics.hodgesLehmann([4], [1])).toEqual({ value: 3, low: null, high: null })
    expect(statistics.hodgesLehmannRatio([4, -1], [2, 0])?.value).toBeCloseTo(2, 12)
  })

  test('change point', () => {
    expect(statistics.pettitt([1])).toBeNull()
    expect(statistics.pettitt([3, 3, 3])).toEqual({ before: 0, k: 0, pValue: 1 })
    expect(statistics.pettitt([1, 1, NaN, 1, 9, 9, 9])?.before).toBe(3)
  })

  test('control charts', () => {
    expect(statistics.ewma(NOTHING, 1, 0.3)).toEqual([])
    expect(statistics.ewma([NaN], 1, 0.3)).toEqual([1])
    expect(statistics.cusum([NaN], 1, 0, 1)).toEqual([{ high: 0, low: 0, signal: false }])
  })

  test('survival', () => {
    expect(statistics.kaplanMeier([])).toEqual([])
    expect(statistics.survivalMedian([])).toEqual({ median: null, low: null, high: null })
    expect(statistics.restrictedMean([])).toBeNull()
    expect(statistics.logRank([], [{ time: 1, event: true }])).toBeNull()
    const allCut = statistics.kaplanMeier([
      { time: 3, event: false },
      { time: NaN, event: true },
    ])
    expect(statistics.survivalMedian(allCut).median).toBeNull()
  })

  test('non-negative least squares', () => {
    expect(statistics.nonNegativeLeastSquares([], []).x).toEqual([])
    expect(() => statistics.nonNegativeLeastSquares([[1]], [1, 2])).toThrow(RangeError)
    expect(() => statistics.nonNegativeLeastSquares([[NaN]], [1])).toThrow(RangeError)
    // Two columns alike: one of the solutions.
    const twins = statistics.nonNegativeLeastSquares([[1, 1]], [2])
    expect((twins.x[0] ?? 0) + (twins.x[1] ?? 0)).toBeCloseTo(2, 12)
  })

  test('permutation test', () => {
    const difference = (a: number[], b: number[]) => (statistics.mean(a) ?? 0) - (statistics.mean(b) ?? 0)
    expect(statistics.permutationTest([], [1], difference)).toBeNull()
    const far = statistics.permutationTest([1, 2, 3, 4, 5, 6], [11, 12, 13, 14, 15, 16], difference)
    expect(far?.pValue).toBeLessThan(0.01)
    expect(far).toEqual(statistics.permutationTest([1, 2, 3, 4, 5, 6], [11, 12, 13, 14, 15, 16], difference))
    expect(statistics.permutationTest([1, 1], [1, 1], difference)?.pValue).toBe(1)
  })
})

describe('distributions', () => {
  test.each([
    [0.5, 0],
    [0.975, 1.959963984540054],
    [0.025, -1.959963984540054],
    [0.0001, -3.719016485455709],
    [1e-12, -7.034483825301132],
  ])('normal quantile of %s and back', (p, z) => {
    expect(statistics.normalQuantile(p)).toBeCloseTo(z, 9)
    expect(statistics.normalCdf(z)).toBeCloseTo(p, 12)
  })

  test('ends and NaN', () => {
    expect(statistics.normalQuantile(0)).toBe(-Infinity)
    expect(statistics.normalQuantile(1)).toBe(Infinity)
    expect(statistics.normalQuantile(1.1)).toBeNaN()
    expect(statistics.normalCdf(NaN)).toBeNaN()
    expect(statistics.normalUpperTail(Infinity)).toBe(0)
    expect(statistics.chiSquaredUpper(3.841458820694124, 1)).toBeCloseTo(0.05, 12)
    expect(statistics.chiSquaredUpper(0, 3)).toBe(1)
  })
})

describe('properties', () => {
  const figures = fc.array(fc.double({ min: -100, max: 100, noNaN: true }), { minLength: 3, maxLength: 12 })

  test('non-negative least squares meets the conditions of Karush, Kuhn and Tucker', () => {
    fc.assert(
      fc.property(
        fc.array(fc.tuple(...Array.from({ length: 4 }, () => fc.double({ min: -3, max: 3, noNaN: true }))), {
          minLength: 4,
          maxLength: 7,
        }),
        figures,
        (A, raw) => {
          const b = A.map((_, index) => raw[index % raw.length] ?? 0)
          const { x } = statistics.nonNegativeLeastSquares(A, b)
          const rest = statistics.residuals(A, b, x)
          const scale = 1e-6 * (1 + Math.max(...b.map(Math.abs)))
          x.forEach((value, column) => {
            const gradient = A.reduce((sum, row, index) => sum + (row[column] ?? 0) * (rest[index] ?? 0), 0)
            expect(value).toBeGreaterThanOrEqual(0)
            expect(gradient).toBeLessThanOrEqual(scale)
            if (value > 1e-6) expect(Math.abs(gradient)).toBeLessThanOrEqual(scale)
          })
        },
      ),
    )
  })

  test('the quadratic form reaches the same minimum, from any start', () => {
    fc.assert(
      fc.property(
        fc.array(fc.tuple(...Array.from({ length: 4 }, () => fc.integer({ min: -5, max: 5 }))), {
          minLength: 5,
          maxLength: 8,
        }),
        figures,
        fc.subarray([0, 1, 2, 3]),
        (A, raw, start) => {
          const b = A.map((_, index) => raw[index % raw.length] ?? 0)
          const exact = statistics.nonNegativeLeastSquares(A, b).residualNorm ** 2
          const { x, value } = statistics.minimiseNonNegative(statistics.quadraticForm(A, b), start)
          expect(Math.min(0, ...x)).toBe(0)
          expect(Math.abs(value - exact)).toBeLessThan(
            1e-6 * (1 + b.reduce((sum, goal) => sum + goal * goal, 0)),
          )
        },
      ),
    )
  })

  test('a held variable costs what the form says', () => {
    const form = statistics.quadraticForm(
      [
        [1, 0],
        [1, 1],
        [0, 2],
      ],
      [1, 2, 3],
    )
    const held = statistics.minimiseNonNegative(statistics.holdVariable(form, 0, 0.5))
    // Left: (1.5 − y)² + (3 − 2y)² + 0.25, least at y = 1.5.
    expect(held.x[1]).toBeCloseTo(1.5, 12)
    expect(held.value).toBeCloseTo(0.25, 12)
  })

  test('a shift of one group shifts Hodges–Lehmann and its interval', () => {
    fc.assert(
      fc.property(figures, figures, fc.double({ min: -50, max: 50, noNaN: true }), (a, b, shift) => {
        const plain = statistics.hodgesLehmann(a, b)
        const moved = statistics.hodgesLehmann(
          a.map((value) => value + shift),
          b,
        )
        expect(moved?.value).toBeCloseTo((plain?.value ?? NaN) + shift, 6)
      }),
    )
  })

  test('inputs stay as they were', () => {
    const frozen = Object.freeze([3, 1, 2, 9])
    statistics.quantile(frozen, 0.3)
    statistics.mannWhitney(frozen, frozen)
    statistics.hodgesLehmann(frozen, frozen)
    statistics.pettitt(frozen)
    statistics.theilSen(points([3, 1, 2]))
    statistics.mannKendall(points([3, 1, 2]))
    statistics.kaplanMeier(
      Object.freeze([Object.freeze({ time: 2, event: true }), Object.freeze({ time: 1, event: false })]),
    )
    expect(frozen).toEqual([3, 1, 2, 9])
  })
})

describe('ratio of times that may be cut short', () => {
  const whole = (times: number[]) => times.map((time) => ({ time, event: true }))
  const cut = (times: number[]) => times.map((time) => ({ time, event: false }))
  const before = whole([50, 55, 60, 62, 70, 58, 61])

  test('without any it is the Hodges–Lehmann ratio', () => {
    const after = whole([110, 120, 131, 99, 140, 125])
    const ratio = statistics.censoredRatio(after, before)
    const plain = statistics.hodgesLehmannRatio(
      after.map((item) => item.time),
      before.map((item) => item.time),
    )
    expect(ratio?.value).toBeCloseTo(plain?.value ?? NaN, 1)
    expect(ratio?.isBound).toBe(false)
    expect(ratio?.low ?? 0).toBeGreaterThan(1.5)
  })

  test('all cut short after: a bound, without an upper end', () => {
    const ratio = statistics.censoredRatio(cut([200, 240, 180, 260]), before)
    expect(ratio).toMatchObject({ isBound: true, high: null })
    expect(ratio?.low ?? 0).toBeGreaterThan(2)
    expect(ratio?.pValue ?? 1).toBeLessThan(0.01)
  })

  test('nothing to compare', () => {
    expect(statistics.censoredRatio([], before)).toBeNull()
    expect(statistics.censoredRatio(cut([1]), cut([2]))).toBeNull()
    expect(statistics.censoredRatio(whole([0, -1]), before)).toBeNull()
  })
})
