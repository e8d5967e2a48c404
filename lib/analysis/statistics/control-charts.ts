export type ControlLimits = { target: number; sigma: number; lambda: number; width: number }

/**
 * Exponentially weighted moving average, starting from `target`: z_t = λ·x_t + (1 − λ)·z_(t−1)
 * (NIST/SEMATECH e-Handbook 6.3.2.4). A NaN leaves it where it was. Nothing: an empty list.
 */
export function ewma(values: readonly number[], target: number, lambda: number): number[] {
  let level = target
  return values.map((value) => {
    if (Number.isFinite(value)) level = lambda * value + (1 - lambda) * level
    return level
  })
}

/** Limits of an EWMA: of the settled chart, or exact after `count` values. */
export function ewmaLimits(limits: ControlLimits, count = Infinity): { low: number; high: number } {
  const { target, sigma, lambda, width } = limits
  const settled = count === Infinity ? 1 : 1 - Math.pow(1 - lambda, 2 * count)
  const reach = width * sigma * Math.sqrt((lambda / (2 - lambda)) * settled)
  return { low: target - reach, high: target + reach }
}

export type CusumPoint = { high: number; low: number; signal: boolean }

/**
 * Tabular CUSUM: S_hi = max(0, S_hi + x − target − k), S_lo the same downwards, a signal where either is
 * over `h`; `k` and `h` in the data's units (NIST/SEMATECH e-Handbook 6.3.2.3). A NaN changes nothing.
 */
export function cusum(values: readonly number[], target: number, k: number, h: number): CusumPoint[] {
  let high = 0
  let low = 0
  return values.map((value) => {
    if (Number.isFinite(value)) {
      high = Math.max(0, high + value - target - k)
      low = Math.max(0, low + target - k - value)
    }
    return { high, low, signal: high > h || low > h }
  })
}
