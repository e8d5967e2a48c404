const Z_95 = 1.959963984540054

/**
 * Theil–Sen slope with Gilbert's (1987, 16.5) 95 % interval, ranks interpolated, for points in ascending x
 * without ties: the same figures as `theilSen` in `lib/analysis/statistics`, in flat arrays because the fold
 * asks for one at every leg of every boat. Ends beyond the outermost slopes stop there. Ties in y narrow
 * the variance of S as they do there. Under two points null.
 */
export function fastTheilSen(
  x: readonly number[],
  y: readonly number[],
): { slope: number; low: number; high: number } | null {
  const size = x.length
  if (size < 2) return null
  const slopes = new Float64Array((size * (size - 1)) / 2)
  let count = 0
  for (let j = 1; j < size; j += 1) {
    const xj = x[j] ?? 0
    const yj = y[j] ?? 0
    for (let i = 0; i < j; i += 1) {
      slopes[count] = (yj - (y[i] ?? 0)) / (xj - (x[i] ?? 0))
      count += 1
    }
  }
  slopes.sort()
  const reach = Z_95 * Math.sqrt(varianceOfS(y))
  return {
    slope: atRank(slopes, (count + 1) / 2),
    low: atRank(slopes, (count - reach) / 2),
    high: atRank(slopes, (count + reach) / 2 + 1),
  }
}

/** Variance of Kendall's S with ties in y alone (Kendall 1970, ch. 4). */
function varianceOfS(y: readonly number[]): number {
  const spread = (t: number): number => t * (t - 1) * (2 * t + 5)
  const sorted = new Float64Array(y.length)
  for (let i = 0; i < y.length; i += 1) sorted[i] = y[i] ?? 0
  sorted.sort()
  let ties = 0
  let run = 1
  for (let i = 1; i <= sorted.length; i += 1) {
    if (i < sorted.length && sorted[i] === sorted[i - 1]) run += 1
    else {
      ties += spread(run)
      run = 1
    }
  }
  return Math.max(0, spread(y.length) - ties) / 18
}

/** Value at a rank from 1, linear between neighbours, held at the ends. */
function atRank(sorted: Float64Array, rank: number): number {
  const held = Math.min(Math.max(rank, 1), sorted.length)
  const below = sorted[Math.floor(held) - 1] ?? 0
  const above = sorted[Math.ceil(held) - 1] ?? below
  return below + (above - below) * (held - Math.floor(held))
}
