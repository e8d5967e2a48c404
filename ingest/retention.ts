import { checkpointBefore, writeCheckpoints } from '@/db/queries/derived'
import { factsOf } from '@/db/queries/facts'
import { dropSamplesBefore, systemsToSeal } from '@/db/queries/retention'
import { lockStates, seal } from '@/db/queries/system-state'
import type { Trx } from '@/db/roles'
import { initialState, parseState, serialiseState, step } from '@/lib/analysis/fold'
import { foldItems } from '@/lib/figures'

/** Systems sealed in one go; the rest follow with the next tick, and the months go when all are sealed. */
const SYSTEMS_AT_ONCE = 100

/**
 * Makes everything before `untilMs` final: the state at its end is kept as a checkpoint, so that later samples can
 * still be folded on when those before are gone.
 * @returns false when facts changed before then are not taken in yet; try again after.
 */
export async function sealSystem(trx: Trx, systemId: string, untilMs: number): Promise<boolean> {
  const [locked] = await lockStates(trx, [systemId])
  if (locked === undefined) return false
  if (locked.rebuildWanted || (locked.refoldFromMs !== null && locked.refoldFromMs < untilMs)) return false
  const found = await checkpointBefore(trx, systemId, untilMs)
  const state = found === null ? initialState() : parseState(JSON.stringify(found.state))
  let atMs = found?.atMs ?? -Infinity
  for await (const page of foldItems(trx, await factsOf(trx, systemId), atMs, untilMs - 1)) {
    for (const item of page) {
      step(state, item)
      if (item.type === 'sample') atMs = item.sample.at
    }
  }
  if (atMs > (found?.atMs ?? -Infinity))
    await writeCheckpoints(trx, systemId, [{ atMs, text: serialiseState(state) }])
  await seal(trx, systemId, new Date(untilMs))
  return true
}

/**
 * For the hourly tick, as the owner of the tables: seals systems at the end of the months that have served their
 * time, and drops those months' samples once every system is sealed. Hourly extremes stay.
 * @param retentionDays how long samples are kept at least (400 or more).
 */
export async function retain(trx: Trx, now: Date, retentionDays: number): Promise<Record<string, number>> {
  const oldest = new Date(now.getTime() - retentionDays * 86_400_000)
  const untilMs = Date.UTC(oldest.getUTCFullYear(), oldest.getUTCMonth(), 1)
  let sealed = 0
  const open = await systemsToSeal(trx, new Date(untilMs), SYSTEMS_AT_ONCE)
  for (const systemId of open) if (await sealSystem(trx, systemId, untilMs)) sealed += 1
  const more = open.length === SYSTEMS_AT_ONCE
  const all = sealed === open.length && !more
  // Those that could not be sealed wait for the next hour; asking for them again at once would not help.
  return {
    sealed,
    dropped: all ? await dropSamplesBefore(trx, new Date(untilMs)) : 0,
    left: more ? sealed : 0,
  }
}
