import { readVesselAccess } from '@/db/queries/vessel-access'
import { asIngest, asPerson } from '@/db/roles'
import { requireRight } from '@/lib/access/require-right'
import type { Who } from '@/lib/auth/who'
import { roleSchema, visitStatusSchema, type VesselAccess } from '@/shared/schemas'

/** Who can see a boat, how much and since when, for its owner. @throws Problem `not-found`, `not-allowed` */
export async function getVesselAccess(who: Who, vesselId: string): Promise<VesselAccess> {
  await asPerson(who.personId, (trx) => requireRight(trx, vesselId, 'giveAccess'))
  const { owners, shops, ended } = await asIngest((trx) => readVesselAccess(trx, vesselId))
  return {
    owners: owners.map((owner) => ({ ...owner, since: owner.since.toISOString() })),
    shops: shops.map((shop) => ({
      ...shop,
      since: shop.since.toISOString(),
      people: shop.people.map(({ name, roles }) => ({
        name,
        roles: roles.map((role) => roleSchema.parse(role)),
      })),
      openVisits: shop.openVisits.map((visit) => ({
        ...visit,
        status: visitStatusSchema.parse(visit.status),
      })),
    })),
    ended: ended.map((row) => ({
      ...row,
      from: row.from.toISOString(),
      until: row.until.toISOString(),
    })),
  }
}
