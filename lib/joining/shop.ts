import { noteAudit } from '@/db/queries/audit'
import { readMembers, readShop, updateShop } from '@/db/queries/joining'
import { asIngest, type Trx } from '@/db/roles'
import { noSuch } from '@/lib/access/require-right'
import type { Who } from '@/lib/auth/who'
import { Problem } from '@/lib/problem'
import { requireZone } from '@/lib/vessels/require-zone'
import { noticeKindSchema, type ChangeShop, type ShopWhole } from '@/shared/schemas'
import { openShop } from './confirm'
import { requireManager } from './invitations'

/** The shop with what it is told and when, for its managers. */
export async function getShop(who: Who, shopId: string): Promise<ShopWhole> {
  requireManager(who, shopId)
  return asIngest((trx) => whole(trx, shopId))
}

/** Changes what is named; the rest stays. @throws Problem `invalid` for an unknown zone or an on-call stranger */
export async function changeShop(
  who: Who,
  shopId: string,
  change: ChangeShop,
  now: Date,
): Promise<ShopWhole> {
  requireManager(who, shopId)
  return asIngest(async (trx) => {
    if (change.timeZone !== undefined) await requireZone(trx, change.timeZone)
    if (change.onCallId != null) await requireMember(trx, shopId, change.onCallId)
    const { quietHours, ...rest } = change
    await updateShop(trx, shopId, {
      ...rest,
      ...(change.harbour === '' ? { harbour: null } : {}),
      quietStart: quietHours?.start,
      quietEnd: quietHours?.end,
    })
    await noteAudit(trx, { at: now, personId: who.personId, shopId, action: 'shop.changed', detail: change })
    return whole(trx, shopId)
  })
}

/** Brings a shop of one's own to Middlewatch; who does is its first manager. */
export async function openOwnShop(
  who: Who,
  input: { name: string; harbour?: string | undefined; timeZone: string },
  now: Date,
): Promise<{ id: string }> {
  const { personId } = who
  return asIngest(async (trx) => {
    await requireZone(trx, input.timeZone)
    const { name, timeZone } = input
    return { id: await openShop(trx, { personId, name, timeZone, harbour: input.harbour || null, at: now }) }
  })
}

async function requireMember(trx: Trx, shopId: string, personId: string): Promise<void> {
  const isMember = (await readMembers(trx, shopId)).some((member) => member.personId === personId)
  if (!isMember)
    throw new Problem('invalid', 'Whoever is on call must be one of the shop’s people.', {
      extensions: { errors: [{ path: 'onCallId', message: 'is not in the shop' }] },
    })
}

async function whole(trx: Trx, shopId: string): Promise<ShopWhole> {
  const shop = await readShop(trx, shopId)
  if (shop === null) throw noSuch('shop')
  const onCall = (await readMembers(trx, shopId)).find((member) => member.personId === shop.onCallId)
  const { id, name, harbour, timeZone } = shop
  return {
    id,
    name,
    harbour,
    timeZone,
    toldKinds: shop.toldKinds?.map((kind) => noticeKindSchema.parse(kind)) ?? null,
    quietHours: { start: shop.quietStart, end: shop.quietEnd },
    onCall: onCall === undefined ? null : { personId: onCall.personId, name: onCall.name },
  }
}
