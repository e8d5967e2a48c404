import { expect, test } from 'vitest'
import { hodgesLehmann, mannWhitney } from '@/lib/analysis/statistics'
import { expectNear } from './near'

test('Hollander & Wolfe (1973) p. 69, permeability (printed p 0.127, shift −0.305, interval −0.76 to 0.15: value from memory)', () => {
  const x = [0.8, 0.83, 1.89, 1.04, 1.45, 1.38, 1.91, 1.64, 0.73, 1.46]
  const y = [1.15, 0.88, 0.9, 0.74, 1.21]
  const result = mannWhitney(x, y)
  expect(result).toMatchObject({ u: 35, method: 'exact' })
  expectNear(result?.pGreater, 0.127206127206127, 1e-12)
  expectNear(result?.pValue, 0.254412254412254, 1e-12)
  const shift = hodgesLehmann(x, y)
  expect(shift?.value).toBeCloseTo(0.305, 12)
  expect(shift?.low).toBeCloseTo(-0.15, 12)
  expect(shift?.high).toBeCloseTo(0.76, 12)
})

test("Student's sleep data with ties, R datasets::sleep", () => {
  const x = [0.7, -1.6, -0.2, -1.2, -0.1, 3.4, 3.7, 0.8, 0, 2]
  const y = [1.9, 0.8, 1.1, 0.1, -0.1, 4.4, 5.5, 1.6, 4.6, 3.4]
  const result = mannWhitney(x, y)
  expect(result).toMatchObject({ u: 25.5, method: 'normal' })
  expectNear(result?.pValue, 0.0693275754336266, 1e-9)
  // The median of the differences, not the −1.3464 of R's root-finder.
  expect(hodgesLehmann(x, y)?.value).toBeCloseTo(-1.35, 12)
})
