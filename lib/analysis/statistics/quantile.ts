import { quantileSorted } from 'simple-statistics'
import { sortedFinite } from './finite'

/**
 * Quantile, linear between order statistics (R's type 7). `p` from 0 to 1. Nothing (or only NaN): null;
 * one value: that value; ties need nothing special.
 * @example quantile([79, 54, 74, 62, 85, 55, 88, 85, 51, 85, 54, 84], 0.25) // 54.75
 */
export function quantile(values: readonly number[], p: number): number | null {
  const sorted = sortedFinite(values)
  return sorted.length === 0 ? null : quantileSorted(sorted, p)
}

/** Middle value, the mean of the two middle ones for an even count. Nothing: null. */
export function median(values: readonly number[]): number | null {
  return quantile(values, 0.5)
}

/**
 * Median absolute deviation from the median, times 1.4826 to read like a standard deviation of normal
 * values (`scale` 1 for the bare figure). Nothing: null; one value: 0.
 */
export function medianAbsoluteDeviation(
  values: readonly number[],
  scale = 1.4826022185056018,
): number | null {
  const middle = median(values)
  if (middle === null) return null
  const spread = median(values.map((value) => Math.abs(value - middle)))
  return spread === null ? null : spread * scale
}
