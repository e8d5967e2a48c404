import { limitLockWait, lockStates, systemsToCatchUp } from '@/db/queries/system-state'
import type { Trx } from '@/db/roles'
import { DERIVER_VERSION } from '@/lib/analysis/fold'
import { isOfAnotherVersion, type Derived } from '@/ingest/derive'
import { settle, settleAnew } from '@/ingest/take-in'

/**
 * Takes a changed fact (settings, fitting, statement, calibration) into a system's rows, in the transaction that
 * changed it. The database has marked the system by itself, so that a change is never lost; one that reaches far
 * back stays marked until the worker comes by.
 * @param since from when on the fact is another.
 * @example await rederive(trx, systemId, inForceFrom, now)
 */
export async function rederive(trx: Trx, systemId: string, since: Date, now: Date): Promise<void> {
  await limitLockWait(trx)
  const [locked] = await lockStates(trx, [systemId])
  if (locked === undefined) return
  // The mark says it more exactly; `since` speaks for what the database cannot see change.
  const change = locked.refoldFromMs === null ? { fromMs: since.getTime(), toMs: since.getTime() } : null
  await settle(trx, locked, change, now)
}

/** `rederive` with its present fixed, as services take it. */
export const rederiveAt =
  (now: Date) =>
  (trx: Trx, systemId: string, since: Date): Promise<void> =>
    rederive(trx, systemId, since, now)

/**
 * Derives a system anew from its samples (from its seal on, where the samples before are gone).
 * @returns what was folded, or null when there is no such system.
 */
export async function rebuildSystem(trx: Trx, systemId: string, now: Date): Promise<Derived | null> {
  const [locked] = await lockStates(trx, [systemId])
  return locked === undefined ? null : settleAnew(trx, locked, now)
}

/**
 * For the tick: brings up to date one system whose facts were changed or whose rows are of another version.
 * @returns the system, or null when all are up to date.
 */
export async function catchUpOne(trx: Trx, now: Date): Promise<string | null> {
  const [systemId] = await systemsToCatchUp(trx, DERIVER_VERSION, 1)
  if (systemId === undefined) return null
  await limitLockWait(trx)
  const [locked] = await lockStates(trx, [systemId])
  if (locked === undefined) return null
  if (locked.rebuildWanted || isOfAnotherVersion(locked)) await settleAnew(trx, locked, now)
  else await settle(trx, locked, null, now, true)
  return systemId
}
