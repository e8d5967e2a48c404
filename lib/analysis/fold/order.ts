import type { Fact, FoldItem, Sample } from './types'

const KIND_ORDER: Record<Fact['kind'], number> = { settings: 0, fitting: 1, removal: 2, statement: 3 }

/**
 * Facts and samples as the items of the fold: by time, facts before samples of the same instant, facts of
 * one instant by kind (settings, fitting, removal, statement), else as given. Inputs are not changed.
 */
export function orderItems(facts: readonly Fact[], samples: readonly Sample[]): FoldItem[] {
  const sortedFacts = [...facts].sort((a, b) => a.at - b.at || KIND_ORDER[a.kind] - KIND_ORDER[b.kind])
  const sortedSamples = [...samples].sort((a, b) => a.at - b.at)
  const items: FoldItem[] = []
  let next = 0
  for (const sample of sortedSamples) {
    let fact = sortedFacts[next]
    while (fact !== undefined && fact.at <= sample.at) {
      items.push({ type: 'fact', fact })
      next += 1
      fact = sortedFacts[next]
    }
    items.push({ type: 'sample', sample })
  }
  for (const fact of sortedFacts.slice(next)) items.push({ type: 'fact', fact })
  return items
}
