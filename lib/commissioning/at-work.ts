import { saidOfSystem, type CommissioningRow } from '@/db/queries/commissioning'
import { asPerson } from '@/db/roles'
import type { Rederive } from '@/lib/access/checked-write'
import type { Who } from '@/lib/auth/who'
import { setStatements } from '@/lib/systems/set-statement'

/** One that is left lying ends by itself. */
const AT_MOST_MS = 4 * 3_600_000

/**
 * While checks are made the system is being worked on: an owner is not told that the pump does not start while its
 * breaker is off for a check. What was said already, such as a lay-up, stays said.
 */
export async function sayAtWork(
  who: Who,
  row: CommissioningRow,
  now: Date,
  rederive: Rederive,
): Promise<void> {
  const { system } = row
  if (system === null || row.fittedAt === null) return
  const said = await asPerson(who.personId, (trx) => saidOfSystem(trx, system.id, now))
  if (said !== null) return
  const until = new Date(now.getTime() + AT_MOST_MS).toISOString()
  await setStatements(who.personId, [system.id], { value: 'worked-on', until }, now, rederive)
}

/** Takes it back once the fitting is signed off or put aside, if it was this fitting that said it. */
export async function sayDone(who: Who, row: CommissioningRow, now: Date, rederive: Rederive): Promise<void> {
  const { system, fittedAt } = row
  if (system === null || fittedAt === null) return
  const said = await asPerson(who.personId, (trx) => saidOfSystem(trx, system.id, now))
  if (said === null || said.value !== 'worked-on' || said.from < fittedAt) return
  await setStatements(who.personId, [system.id], { value: null }, now, rederive)
}
