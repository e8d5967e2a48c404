import { noteAudit } from '@/db/queries/audit'
import { grantAccess, shopExists, withdrawAccess as withdraw } from '@/db/queries/vessels'
import { checkedWrite } from '@/lib/access/checked-write'
import { noSuch, requireRight } from '@/lib/access/require-right'
import type { AccessLevel } from '@/shared/schemas'

/** The owner lets a shop see the boat, or changes how much. @throws Problem `not-found`, `not-allowed` */
export async function setAccess(
  personId: string,
  grant: { vesselId: string; shopId: string; level: AccessLevel },
  now: Date,
): Promise<{ shopId: string; level: AccessLevel }> {
  const { vesselId, shopId, level } = grant
  return checkedWrite(
    personId,
    (trx) => requireRight(trx, vesselId, 'giveAccess'),
    async (trx) => {
      if (!(await shopExists(trx, shopId))) throw noSuch('shop')
      await grantAccess(trx, { vesselId, shopId, level, grantedBy: personId, at: now })
      await noteAudit(trx, {
        at: now,
        personId,
        vesselId,
        shopId,
        action: 'access.given',
        detail: { level },
      })
      return { shopId, level }
    },
  )
}

/** The owner takes the shop's sight away; it keeps the visits it did. */
export async function withdrawAccess(
  personId: string,
  vesselId: string,
  shopId: string,
  now: Date,
): Promise<{ done: true }> {
  return checkedWrite(
    personId,
    (trx) => requireRight(trx, vesselId, 'giveAccess'),
    async (trx) => {
      if (!(await withdraw(trx, vesselId, shopId, now))) throw noSuch('consent')
      await noteAudit(trx, { at: now, personId, vesselId, shopId, action: 'access.withdrawn' })
      return { done: true }
    },
  )
}
