import { noteAudit } from '@/db/queries/audit'
import { insertVisit, shopsOfVessel, systemIsOn } from '@/db/queries/visits'
import { checkedWrite } from '@/lib/access/checked-write'
import { noSuch, requireRight } from '@/lib/access/require-right'
import { rightsOf } from '@/lib/access/rights'
import type { Who } from '@/lib/auth/who'
import { Problem } from '@/lib/problem'
import type { AskVisit } from '@/shared/schemas'

/**
 * The owner asks a shop for a visit, or a shop's technician or manager opens one. The shop may be left out where
 * only one comes into question. @throws Problem `not-found`, `not-allowed`, `invalid`
 */
export async function askVisit(
  who: Who,
  vesselId: string,
  asked: AskVisit,
  now: Date,
): Promise<{ id: string }> {
  return checkedWrite(
    who.personId,
    (trx) => requireRight(trx, vesselId, 'askVisit'),
    async (trx, standing) => {
      const seeing = await shopsOfVessel(trx, vesselId)
      const own = who.memberships
        .filter(({ role }) => role === 'technician' || role === 'manager')
        .map(({ shopId }) => shopId)
      const possible = standing.owns ? seeing : seeing.filter((shopId) => own.includes(shopId))
      const shopId = chooseShop(possible, asked.shopId)
      if (asked.systemId !== undefined && !(await systemIsOn(trx, asked.systemId, vesselId)))
        throw noSuch('system')
      const id = await insertVisit(trx, {
        vesselId,
        systemId: asked.systemId ?? null,
        shopId,
        complaint: asked.complaint,
        askedBy: who.personId,
        askedAt: now,
      })
      await noteAudit(trx, {
        at: now,
        personId: who.personId,
        vesselId,
        shopId,
        action: 'visit.asked',
        detail: { visitId: id, byOwner: rightsOf(standing).giveAccess },
      })
      return { id }
    },
  )
}

function chooseShop(possible: readonly string[], named: string | undefined): string {
  if (named !== undefined) {
    if (possible.includes(named)) return named
    throw new Problem('invalid', 'That shop does not see the boat: let it see the leak figures first.')
  }
  const [only, ...others] = possible
  if (only === undefined)
    throw new Problem('invalid', 'No shop sees the boat yet: let one see its leak figures first.')
  if (others.length > 0)
    throw new Problem('invalid', 'Several shops see the boat: say which one, by its shopId.')
  return only
}
