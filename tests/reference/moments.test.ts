import { linearRegression } from 'simple-statistics'
import { expect, test } from 'vitest'
import { lagOneAutocorrelation, mean, standardDeviation } from '@/lib/analysis/statistics'
import { FAITHFUL_ERUPTIONS, FAITHFUL_WAITING } from './data-sets'
import { expectNear } from './near'

const alternating = (first: number, low: number, high: number) => [
  first,
  ...Array.from({ length: 1000 }, (_, index) => (index % 2 === 0 ? low : high)),
]

test.each([
  {
    source: 'NIST StRD Michelso',
    y: [
      299.85, 299.74, 299.9, 300.07, 299.93, 299.85, 299.95, 299.98, 299.98, 299.88, 300.0, 299.98, 299.93,
      299.65, 299.76, 299.81, 300.0, 300.0, 299.96, 299.96, 299.96, 299.94, 299.96, 299.94, 299.88, 299.8,
      299.85, 299.88, 299.9, 299.84, 299.83, 299.79, 299.81, 299.88, 299.88, 299.83, 299.8, 299.79, 299.76,
      299.8, 299.88, 299.88, 299.88, 299.86, 299.72, 299.72, 299.62, 299.86, 299.97, 299.95, 299.88, 299.91,
      299.85, 299.87, 299.84, 299.84, 299.85, 299.84, 299.84, 299.84, 299.89, 299.81, 299.81, 299.82, 299.8,
      299.77, 299.76, 299.74, 299.75, 299.76, 299.91, 299.92, 299.89, 299.86, 299.88, 299.72, 299.84, 299.85,
      299.85, 299.78, 299.89, 299.84, 299.78, 299.81, 299.76, 299.81, 299.79, 299.81, 299.82, 299.85, 299.87,
      299.87, 299.81, 299.74, 299.81, 299.94, 299.95, 299.8, 299.81, 299.87,
    ],
    expected: [299.8524, 0.0790105478190518, 0.535199668621283],
    tolerance: 1e-12,
  },
  {
    source: 'NIST StRD Mavro',
    y: [
      2.0018, 2.0017, 2.0018, 2.0019, 2.0018, 2.0017, 2.0015, 2.0014, 2.0015, 2.0015, 2.0017, 2.0018, 2.0018,
      2.0019, 2.0019, 2.0021, 2.002, 2.0016, 2.0014, 2.0013, 2.0013, 2.0015, 2.0015, 2.0016, 2.0015, 2.0014,
      2.0013, 2.0014, 2.0015, 2.0014, 2.0015, 2.0016, 2.0015, 2.0016, 2.0019, 2.002, 2.002, 2.0021, 2.0022,
      2.0023, 2.0024, 2.0025, 2.0027, 2.0026, 2.0026, 2.0026, 2.0027, 2.0026, 2.0025, 2.0024,
    ],
    expected: [2.001856, 0.000429123454003053, 0.937989183438248],
    tolerance: 1e-11,
  },
  {
    source: 'NIST StRD NumAcc1',
    y: [10000001, 10000003, 10000002],
    expected: [10000002, 1, -0.5],
    tolerance: 1e-9,
  },
  {
    source: 'NIST StRD NumAcc2',
    y: alternating(1.2, 1.1, 1.3),
    expected: [1.2, 0.1, -0.999],
    tolerance: 1e-9,
  },
  {
    source: 'NIST StRD NumAcc3',
    y: alternating(1000000.2, 1000000.1, 1000000.3),
    expected: [1000000.2, 0.1, -0.999],
    tolerance: 1e-8,
  },
  {
    source: 'NIST StRD NumAcc4',
    y: alternating(10000000.2, 10000000.1, 10000000.3),
    expected: [10000000.2, 0.1, -0.999],
    tolerance: 1e-8,
  },
  {
    source: 'R datasets::faithful, waiting',
    y: FAITHFUL_WAITING,
    expected: [70.8970588235294, 13.5949737899994, -0.539380714481073],
    tolerance: 1e-9,
  },
  {
    source: 'R datasets::faithful, eruptions',
    y: FAITHFUL_ERUPTIONS,
    expected: [3.48778308823529, 1.14137125110521, -0.549187800190752],
    tolerance: 1e-9,
  },
])('$source: mean, standard deviation, lag-1 autocorrelation', ({ y, expected, tolerance }) => {
  expectNear(mean(y), expected[0] ?? NaN, tolerance)
  expectNear(standardDeviation(y), expected[1] ?? NaN, tolerance)
  expectNear(lagOneAutocorrelation(y), expected[2] ?? NaN, Math.max(tolerance, 1e-7))
})

test('NIST StRD Norris: the straight line of the library we rely on', () => {
  const x = [
    0.2, 337.4, 118.2, 884.6, 10.1, 226.5, 666.3, 996.3, 448.6, 777.0, 558.2, 0.4, 0.6, 775.5, 666.9, 338.0,
    447.5, 11.6, 556.0, 228.1, 995.8, 887.6, 120.2, 0.3, 0.3, 556.8, 339.1, 887.2, 999.0, 779.0, 11.1, 118.3,
    229.2, 669.1, 448.9, 0.5,
  ]
  const y = [
    0.1, 338.8, 118.1, 888.0, 9.2, 228.1, 668.5, 998.5, 449.1, 778.9, 559.2, 0.3, 0.1, 778.1, 668.8, 339.3,
    448.9, 10.8, 557.7, 228.3, 998.0, 888.8, 119.6, 0.3, 0.6, 557.6, 339.3, 888.0, 998.5, 778.9, 10.2, 117.6,
    228.9, 668.4, 449.2, 0.2,
  ]
  const line = linearRegression(x.map((value, index) => [value, y[index] ?? NaN]))
  expectNear(line.m, 1.00211681802045, 1e-9)
  expect(line.b).toBeCloseTo(-0.262323073774029, 7)
})
