import { noteAudit } from '@/db/queries/audit'
import { findPersonByEmail } from '@/db/queries/people'
import { addOwner, grantAccess, insertVessel } from '@/db/queries/vessels'
import { asIngest, type Trx } from '@/db/roles'
import type { Who } from '@/lib/auth/who'
import { noSuch } from '@/lib/access/require-right'
import { inviteOwner } from '@/lib/people/invite'
import { Problem } from '@/lib/problem'
import { insertSystemWithSetting } from '@/lib/systems/add-system'
import { requireZone } from '@/lib/vessels/require-zone'
import type { CreateVessel } from '@/shared/schemas'

/**
 * Sets up a vessel with its first system. Whose it is: the person with `ownerEmail`, who lets the creating shop
 * see all of it; without such a person the creating shop keeps it until an owner accepts; without a shop the
 * creator owns it.
 * @throws Problem `not-found` for a shop one is not in, `invalid` for an unknown zone or an owner without a shop
 */
export async function createVessel(
  who: Who,
  input: CreateVessel,
  now: Date,
): Promise<{ id: string; systems: { id: string }[] }> {
  const shopId = shopOf(who, input)
  return asIngest(async (trx) => {
    await requireZone(trx, input.timeZone)
    const ownerId = await ownerOf(trx, who, input, shopId)
    const id = await insertVessel(trx, {
      name: input.name,
      timeZone: input.timeZone,
      quietHours: input.quietHours,
      altitudeM: input.altitudeM,
      harbour: input.harbour,
      berth: input.berth,
      keptByShopId: ownerId === null ? shopId : null,
    })
    if (ownerId !== null) {
      await addOwner(trx, id, ownerId, now)
      if (shopId !== null)
        await grantAccess(trx, { vesselId: id, shopId, level: 'full', grantedBy: ownerId, at: now })
    } else if (input.ownerEmail !== undefined) {
      await inviteOwner(trx, { email: input.ownerEmail, vesselId: id, invitedBy: who.personId, now })
    }
    const systemId = await insertSystemWithSetting(trx, id, input.system ?? {}, who.personId, now)
    await noteAudit(trx, {
      at: now,
      personId: who.personId,
      vesselId: id,
      shopId: shopId ?? undefined,
      action: 'vessel.created',
      detail: { name: input.name },
    })
    return { id, systems: [{ id: systemId }] }
  })
}

/** The creating shop: the one named, or the only one of somebody who is in one and doesn't register their own boat. */
function shopOf(who: Who, input: CreateVessel): string | null {
  const shops = [...new Set(who.memberships.map((membership) => membership.shopId))]
  if (input.shopId !== undefined) {
    if (!shops.includes(input.shopId)) throw noSuch('shop')
    return input.shopId
  }
  if (isOwn(who, input)) return null
  const [only, ...others] = shops
  if (others.length > 0)
    throw new Problem('invalid', 'Say which of your shops sets the boat up: name its shopId.')
  return only ?? null
}

const isOwn = (who: Who, input: CreateVessel): boolean =>
  input.ownerEmail !== undefined && input.ownerEmail.toLowerCase() === who.email.toLowerCase()

async function ownerOf(
  trx: Trx,
  who: Who,
  input: CreateVessel,
  shopId: string | null,
): Promise<string | null> {
  if (shopId === null) {
    if (input.ownerEmail !== undefined && !isOwn(who, input))
      throw new Problem('invalid', 'Only a shop sets up a boat for somebody else: leave ownerEmail out.')
    return who.personId
  }
  return input.ownerEmail === undefined ? null : findPersonByEmail(trx, input.ownerEmail)
}
