import { mean as meanOf, sampleStandardDeviation } from 'simple-statistics'
import { finite } from './finite'

/** Arithmetic mean. Nothing: null. */
export function mean(values: readonly number[]): number | null {
  const known = finite(values)
  return known.length === 0 ? null : meanOf(known)
}

/** Sample standard deviation (n − 1), in two passes. Fewer than two values: null. */
export function standardDeviation(values: readonly number[]): number | null {
  const known = finite(values)
  return known.length < 2 ? null : sampleStandardDeviation(known)
}

/** Lag-1 autocorrelation as NIST StRD defines it. Fewer than two values, or all alike: null. */
export function lagOneAutocorrelation(values: readonly number[]): number | null {
  const known = finite(values)
  const middle = mean(known)
  if (middle === null || known.length < 2) return null
  let products = 0
  let squares = 0
  let before: number | null = null
  for (const value of known) {
    const off = value - middle
    squares += off * off
    if (before !== null) products += before * off
    before = off
  }
  return squares === 0 ? null : products / squares
}
