import { noteAudit } from '@/db/queries/audit'
import { addMembership, endMemberships, lockShop, readMembers, type Member } from '@/db/queries/joining'
import { asIngest, type Trx } from '@/db/roles'
import { noSuch } from '@/lib/access/require-right'
import type { Who } from '@/lib/auth/who'
import { Problem } from '@/lib/problem'
import { roleSchema, type List, type Role, type ShopPerson } from '@/shared/schemas'
import { requireManager } from './invitations'

/** Who is in the shop, for its managers. */
export async function listPeople(who: Who, shopId: string): Promise<List<ShopPerson>> {
  requireManager(who, shopId)
  return { items: (await asIngest((trx) => readMembers(trx, shopId))).map(onWire), next: null }
}

/**
 * Sets somebody's roles in the shop; none is out of it. What they may see follows with their next request.
 * @throws Problem `not-found` for who is not in it, `conflict` when it would leave the shop without a manager
 */
export async function setRoles(
  who: Who,
  shopId: string,
  personId: string,
  roles: Role[],
  now: Date,
): Promise<{ done: true }> {
  requireManager(who, shopId)
  await asIngest((trx) => changeRoles(trx, { by: who.personId, shopId, personId, roles, now }))
  return { done: true }
}

/** Leaves a shop oneself. */
export async function leaveShop(who: Who, shopId: string, now: Date): Promise<{ done: true }> {
  if (!who.memberships.some((entry) => entry.shopId === shopId)) throw noSuch('shop')
  const { personId } = who
  await asIngest((trx) => changeRoles(trx, { by: personId, shopId, personId, roles: [], now }))
  return { done: true }
}

async function changeRoles(
  trx: Trx,
  change: { by: string; shopId: string; personId: string; roles: Role[]; now: Date },
): Promise<void> {
  const { by, shopId, personId, now } = change
  const roles = [...new Set(change.roles)]
  // Two managers who take each other out at once must not both succeed.
  await lockShop(trx, shopId)
  const members = await readMembers(trx, shopId)
  const member = members.find((candidate) => candidate.personId === personId)
  if (member === undefined) throw noSuch('person')
  const others = members.filter((candidate) => candidate !== member)
  if (!roles.includes('manager') && !others.some((other) => other.roles.includes('manager')))
    throw new Problem('conflict', 'The last manager stays: make somebody else a manager first.')
  await endMemberships(
    trx,
    { shopId, personId, roles: member.roles.filter((role) => !roles.some((kept) => kept === role)) },
    now,
  )
  for (const role of roles) await addMembership(trx, { shopId, personId, role, at: now })
  await noteAudit(trx, {
    at: now,
    personId: by,
    shopId,
    action: roles.length === 0 ? 'person.left' : 'person.roles',
    detail: { personId, name: member.name, roles },
  })
}

const onWire = (member: Member): ShopPerson => ({
  personId: member.personId,
  name: member.name,
  email: member.email,
  roles: member.roles.map((role) => roleSchema.parse(role)),
  since: member.since.toISOString(),
})
