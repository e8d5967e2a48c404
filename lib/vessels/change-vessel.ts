import { noteAudit } from '@/db/queries/audit'
import { readVessel, updateVessel } from '@/db/queries/vessels'
import { checkedWrite } from '@/lib/access/checked-write'
import { requireRight } from '@/lib/access/require-right'
import type { ChangeVessel } from '@/shared/schemas'
import { requireZone } from './require-zone'

/** Changes what is said of a boat. @throws Problem `not-found`, `not-allowed`, `invalid` for an unknown zone */
export async function changeVessel(
  personId: string,
  vesselId: string,
  change: ChangeVessel,
  now: Date,
): Promise<{ done: true }> {
  return checkedWrite(
    personId,
    async (trx) => {
      const standing = await requireRight(trx, vesselId, 'changeVessel')
      if (change.timeZone !== undefined) await requireZone(trx, change.timeZone)
      return standing
    },
    async (trx) => {
      const vessel = await readVessel(trx, vesselId, now)
      await updateVessel(trx, vesselId, change)
      const before = Object.fromEntries(Object.entries(vessel ?? {}).filter(([field]) => field in change))
      await noteAudit(trx, {
        at: now,
        personId,
        vesselId,
        action: 'vessel.changed',
        detail: { ...change, before },
      })
      return { done: true }
    },
  )
}
