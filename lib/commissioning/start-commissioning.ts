import { insertCommissioning } from '@/db/queries/commissioning'
import { asPerson } from '@/db/roles'
import { checkedWrite } from '@/lib/access/checked-write'
import { requireSystemRight } from '@/lib/access/require-right'
import type { Who } from '@/lib/auth/who'
import { getClaim } from '@/lib/loggers/answer-claim'
import type { Commissioning, StartCommissioning } from '@/shared/schemas'
import { commissioningOnWire } from './on-wire'
import { requireCommissioning, requireFitter } from './require-commissioning'

/**
 * Begins a commissioning: from the code that a logger shows, or from a serial typed or chosen.
 * @throws Problem `not-allowed`, `not-found` for a code that nobody shows or a system out of sight
 */
export async function startCommissioning(
  who: Who,
  start: StartCommissioning,
  now: Date,
): Promise<Commissioning> {
  requireFitter(who)
  const claim = start.way === 'claim' ? await getClaim(who, start.userCode, now) : null
  const serial = start.way === 'claim' ? (claim?.serial ?? '') : start.serial
  const systemId = start.systemId ?? null
  const id = await checkedWrite(
    who.personId,
    async (trx) => (systemId === null ? null : requireSystemRight(trx, systemId, 'registerLogger')),
    (trx) =>
      insertCommissioning(trx, {
        startedBy: who.personId,
        shopId: shopOf(who),
        startedAt: now,
        way: start.way,
        serial,
        userCode: claim?.userCode ?? null,
        systemId,
      }),
  )
  return commissioningOnWire(await asPerson(who.personId, (trx) => requireCommissioning(trx, who, id, now)))
}

const shopOf = (who: Who): string | null =>
  who.memberships.find(({ role }) => role === 'installer' || role === 'manager')?.shopId ?? null
