import { expect, test } from 'vitest'
import { cusum, ewma, ewmaLimits } from '@/lib/analysis/statistics'
import { expectNear } from './near'

test('NIST/SEMATECH e-Handbook 6.3.2.4 (doi 10.18434/M32189): EWMA', () => {
  const x = [
    52.0, 47.0, 53.0, 49.3, 50.1, 47.0, 51.0, 50.1, 51.2, 50.5, 49.6, 47.6, 49.9, 51.3, 47.8, 51.2, 52.6,
    52.4, 53.6, 52.1,
  ]
  const exact = [
    50.6, 49.52, 50.564, 50.1848, 50.15936, 49.211552, 49.7480864, 49.85366048, 50.257562336, 50.3302936352,
    50.1112055446, 49.3578438812, 49.5204907169, 50.0543435018, 49.3780404513, 49.9246283159, 50.7272398211,
    51.2290678748, 51.9403475123, 51.9882432586,
  ]
  const printed = [
    50.6, 49.52, 50.56, 50.18, 50.16, 49.21, 49.75, 49.85, 50.26, 50.33, 50.11, 49.36, 49.52, 50.05, 49.38,
    49.92, 50.73, 51.23, 51.94, 51.99,
  ]
  const chart = ewma(x, 50, 0.3)
  chart.forEach((value, index) => {
    expectNear(value, exact[index] ?? NaN, 1e-11)
    expect(Math.abs(value - (printed[index] ?? NaN))).toBeLessThan(0.0051)
  })
  const settings = { target: 50, sigma: 2.0539, lambda: 0.3, width: 3 }
  expectNear(ewmaLimits(settings).high, 52.588431738126616, 1e-12)
  expectNear(ewmaLimits(settings).low, 47.411568261873384, 1e-12)
  const early = [51.84851, 52.256394, 52.431406, 52.512715, 52.551611]
  early.forEach((limit, index) => expectNear(ewmaLimits(settings, index + 1).high, limit, 1e-7))
  expect(chart.filter((value) => value > 52.5884 || value < 47.4115)).toEqual([])
})

test('NIST/SEMATECH e-Handbook 6.3.2.3: tabular CUSUM', () => {
  const x = [
    324.925, 324.675, 324.725, 324.35, 325.35, 325.225, 324.125, 324.525, 325.225, 324.6, 324.625, 325.15,
    328.325, 327.25, 327.825, 328.5, 326.675, 327.775, 326.875, 328.35,
  ]
  const high = [
    0.0, 0.0, 0.0, 0.0, 0.0325, 0.0, 0.0, 0.0, 0.0, 0.0, 0.0, 0.0, 3.0075, 4.94, 7.4475, 10.63, 11.9875,
    14.445, 16.0025, 19.035,
  ]
  const low = [
    0.0, 0.0075, 0.0, 0.3325, 0.0, 0.0, 0.5575, 0.715, 0.1725, 0.255, 0.3125, 0.0, 0.0, 0.0, 0.0, 0.0, 0.0,
    0.0, 0.0, 0.0,
  ]
  const chart = cusum(x, 325, 0.3175, 4.1959)
  chart.forEach((point, index) => {
    expect(point.high).toBeCloseTo(high[index] ?? NaN, 9)
    expect(point.low).toBeCloseTo(low[index] ?? NaN, 9)
  })
  const signals = chart.flatMap((point, index) => (point.signal ? [index + 1] : []))
  expect(signals).toEqual([14, 15, 16, 17, 18, 19, 20])
})
