import { wilcoxonRankSum } from 'simple-statistics'
import { describe, expect, test } from 'vitest'
import { median, medianAbsoluteDeviation, quantile } from '@/lib/analysis/statistics'
import { FAITHFUL_ERUPTIONS, FAITHFUL_WAITING } from './data-sets'
import { expectNear } from './near'

describe.each([
  {
    source: 'R 4.2.2 datasets::faithful$waiting',
    values: FAITHFUL_WAITING,
    p: [0.05, 0.1, 0.25, 0.5, 0.75, 0.9, 0.95],
    type7: [48, 51, 58, 76, 82, 86, 89],
  },
  {
    source: 'R datasets::faithful$eruptions',
    values: FAITHFUL_ERUPTIONS,
    p: [0.05, 0.1, 0.25, 0.5, 0.75, 0.9, 0.95],
    type7: [1.8, 1.8517, 2.16275, 4, 4.45425, 4.7, 4.817],
  },
  {
    source: 'first 12 of faithful$waiting, R quantile type 7',
    values: [79, 54, 74, 62, 85, 55, 88, 85, 51, 85, 54, 84],
    p: [0.1, 0.25, 0.5, 0.75, 0.9],
    type7: [54, 54.75, 76.5, 85, 85],
  },
  {
    source: 'NIST/SEMATECH e-Handbook 7.2.6.2 wafers (printed R7 95.1957)',
    values: [
      95.1772, 95.1567, 95.1937, 95.1959, 95.1442, 95.061, 95.1591, 95.1195, 95.1065, 95.0925, 95.199,
      95.1682,
    ],
    p: [0.9],
    type7: [95.19568],
  },
  {
    source: 'simple-statistics list since 7.8.9',
    values: [3, 6, 7, 8, 8, 9, 10, 13, 15, 16, 20],
    p: [0.1, 0.25, 0.5, 0.75, 0.9],
    type7: [6, 7.5, 9, 14, 16],
  },
])('$source', ({ values, p, type7 }) => {
  test('type 7 quantiles', () => {
    p.forEach((share, index) => expectNear(quantile(values, share), type7[index] ?? NaN, 1e-9))
  })
})

test('R datasets::faithful: median and unscaled median absolute deviation', () => {
  expect(median(FAITHFUL_WAITING)).toBe(76)
  expect(medianAbsoluteDeviation(FAITHFUL_WAITING, 1)).toBe(8)
  expect(median(FAITHFUL_ERUPTIONS)).toBe(4)
  expect(medianAbsoluteDeviation(FAITHFUL_ERUPTIONS, 1)).toBeCloseTo(0.6415, 12)
})

test('the pinned simple-statistics ranks ties rightly (since 7.10.0)', () => {
  expect(wilcoxonRankSum([1, 2, 2, 3], [2, 3, 4])).toBe(12.5)
})
