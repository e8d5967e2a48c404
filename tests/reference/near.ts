import { expect } from 'vitest'

/** Expects a figure within a relative tolerance. */
export function expectNear(actual: number | null | undefined, expected: number, relative: number): void {
  const off = Math.abs((actual ?? NaN) - expected)
  expect(off, `${String(actual)} against ${expected}`).toBeLessThanOrEqual(
    relative * Math.abs(expected) + 1e-300,
  )
}

/** Expects two lists of the same length, each figure within a relative tolerance. */
export function expectAllNear(
  actual: readonly number[],
  expected: readonly number[],
  relative: number,
): void {
  expect(actual).toHaveLength(expected.length)
  expected.forEach((value, index) => expectNear(actual[index], value, relative))
}
