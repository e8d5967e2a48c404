import type { IsolationPart, PartKind } from './types'

/** How often each kind of part is the leaking one (judged; to be refitted from what visits find). */
export const PRIOR_BY_KIND: Readonly<Record<PartKind, number>> = {
  head: 0.4,
  pump: 0.22,
  hose: 0.2,
  tank: 0.1,
  switch: 0.08,
}

/**
 * Chance of each part to be the leak before any test, adding up to 1: its kind's share, split evenly among
 * the parts of that kind, over the kinds that are there. `factors` are what the boat's record says.
 */
export function partPriors(
  parts: readonly IsolationPart[],
  factors: Readonly<Record<string, number>> = {},
): Map<string, number> {
  const alike = (kind: PartKind) => parts.filter((part) => part.kind === kind).length
  const weights = parts.map(
    (part) => (PRIOR_BY_KIND[part.kind] / alike(part.kind)) * (factors[part.key] ?? 1),
  )
  const total = weights.reduce((sum, weight) => sum + weight, 0)
  return new Map(parts.map((part, index) => [part.key, (weights[index] ?? 0) / total]))
}
