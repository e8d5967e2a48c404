import { readCommissioning, type CommissioningRow } from '@/db/queries/commissioning'
import type { Trx } from '@/db/roles'
import { noSuch, requireSystemRight } from '@/lib/access/require-right'
import type { Who } from '@/lib/auth/who'
import { Problem } from '@/lib/problem'

/**
 * One that the person sees and may work on: by the right to register loggers on its system, or, before a system is
 * chosen, as the one who began it or as installer or manager of their shop.
 * @throws Problem `not-found`, `not-allowed`
 */
export async function requireCommissioning(
  trx: Trx,
  who: Who,
  id: string,
  now: Date,
): Promise<CommissioningRow> {
  const row = await readCommissioning(trx, id, now)
  if (row === null) throw noSuch('commissioning')
  if (row.system !== null) await requireSystemRight(trx, row.system.id, 'registerLogger')
  return row
}

/** The same, and still open. @throws Problem `conflict` once it is signed off */
export async function requireOpen(trx: Trx, who: Who, id: string, now: Date): Promise<CommissioningRow> {
  const row = await requireCommissioning(trx, who, id, now)
  if (row.finishedAt !== null)
    throw new Problem('conflict', 'This commissioning is signed off: begin another to check again.')
  return row
}

/** May the person fit loggers at all: as an installer or manager of a shop, or on a boat of their own. */
export function requireFitter(who: Who): void {
  if (who.ownsVessels || who.memberships.some(({ role }) => role === 'installer' || role === 'manager'))
    return
  throw new Problem('not-allowed', 'Loggers are registered by the owner, an installer or the shop’s manager.')
}
