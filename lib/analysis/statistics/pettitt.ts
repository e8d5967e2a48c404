import { finite, midranks } from './finite'

export type ChangePoint = {
  /** How many values lie before the change. */
  before: number
  k: number
  pValue: number
}

/**
 * Pettitt's test for one change of level in a series: the largest |U_t|, U_t = 2·Σ rank − t·(n + 1), with
 * p ≈ 2·exp(−6·K²/(n³ + n²)) (Pettitt 1979, Applied Statistics 28, 126). Of equal peaks the first. Fewer
 * than 2 values: null; all alike: k 0, p 1. NaN left out.
 */
export function pettitt(values: readonly number[]): ChangePoint | null {
  const known = finite(values)
  const n = known.length
  if (n < 2) return null
  let rankSum = 0
  let best = { before: 0, k: 0 }
  midranks(known)
    .slice(0, -1)
    .forEach((rank, index) => {
      rankSum += rank
      const u = Math.abs(2 * rankSum - (index + 1) * (n + 1))
      if (u > best.k) best = { before: index + 1, k: u }
    })
  const pValue = Math.min(1, 2 * Math.exp((-6 * best.k * best.k) / (n * n * n + n * n)))
  return { ...best, pValue }
}
