import { checkpointBefore } from '@/db/queries/derived'
import { factsOf, type StoredFacts } from '@/db/queries/facts'
import { readState } from '@/db/queries/system-state'
import type { Trx } from '@/db/roles'
import { initialState, parseState, step, type FoldState, type Instant } from '@/lib/analysis/fold'
import { foldItems } from '@/lib/figures/fold-items'

/**
 * The state of a system's fold as of an instant: the head when that is no later, else the last checkpoint before
 * it, folded on.
 * @param trx under the service's role: samples are read.
 */
export async function stateAt(
  trx: Trx,
  systemId: string,
  at: Instant,
): Promise<{ state: FoldState; facts: StoredFacts }> {
  const facts = await factsOf(trx, systemId)
  const head = await readState(trx, systemId)
  if (head !== null && head.headAtMs !== null && head.headAtMs <= at)
    return { state: parseState(JSON.stringify(head.head)), facts }
  const found = await checkpointBefore(trx, systemId, at, true)
  const state = found === null ? initialState() : parseState(JSON.stringify(found.state))
  for await (const page of foldItems(trx, facts, found?.atMs ?? -Infinity, at)) {
    for (const item of page) step(state, item)
  }
  return { state, facts }
}
