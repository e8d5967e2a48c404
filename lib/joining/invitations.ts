import {
  readInvitation,
  readWaitingInvitations,
  withdrawInvitation as withdraw,
  type InvitationRow,
} from '@/db/queries/invitations'
import { noteAudit } from '@/db/queries/audit'
import { readMembers } from '@/db/queries/joining'
import { asIngest, asPerson, type Trx } from '@/db/roles'
import { noSuch, requireRight } from '@/lib/access/require-right'
import { countMail } from '@/lib/auth/throttle'
import type { Who } from '@/lib/auth/who'
import { Problem } from '@/lib/problem'
import type { Invitation, Invite, List } from '@/shared/schemas'
import { sendInvitation } from './send-invitation'

const INVITERS_TO_VESSEL = ['installer', 'manager']

/** @throws Problem `not-found` for a shop one is not in, `not-allowed` for all but its managers */
export function requireManager(who: Who, shopId: string): void {
  const roles = who.memberships.filter((entry) => entry.shopId === shopId).map((entry) => entry.role)
  if (roles.length === 0) throw noSuch('shop')
  if (!roles.includes('manager')) throw new Problem('not-allowed', 'This is for the shop’s managers.')
}

/** Owners invite further owners; a shop that keeps a boat invites its first one. @throws Problem */
async function requireVesselInviter(who: Who, vesselId: string): Promise<void> {
  const standing = await asPerson(who.personId, (trx) => requireRight(trx, vesselId, null))
  const mayForShop = standing.keeps && standing.roles.some((role) => INVITERS_TO_VESSEL.includes(role))
  if (!standing.owns && !mayForShop)
    throw new Problem(
      'not-allowed',
      'Owners are invited by an owner, or by the shop that keeps the boat until then.',
    )
}

async function requireInviter(
  who: Who,
  to: { shopId: string | null; vesselId: string | null },
): Promise<void> {
  if (to.shopId !== null) requireManager(who, to.shopId)
  else if (to.vesselId !== null) await requireVesselInviter(who, to.vesselId)
}

/** Invites somebody into a shop with a role, or to own a vessel. @throws Problem `conflict` for who is in it already */
export async function invite(who: Who, input: Invite, from: string, now: Date): Promise<Invitation> {
  const to = {
    email: input.email,
    shopId: input.shopId ?? null,
    role: input.role ?? null,
    vesselId: input.vesselId ?? null,
    invitedBy: who.personId,
  }
  await requireInviter(who, to)
  await countMail(to.email, from)
  return asIngest(async (trx) => {
    await refuseMember(trx, to)
    const id = await sendInvitation(trx, to, now)
    await note(trx, who, to, 'invitation.sent', now)
    return read(trx, id)
  })
}

async function refuseMember(
  trx: Trx,
  to: { email: string; shopId: string | null; role: string | null },
): Promise<void> {
  if (to.shopId === null || to.role === null) return
  const member = (await readMembers(trx, to.shopId)).find(
    ({ email }) => email.toLowerCase() === to.email.toLowerCase(),
  )
  if (member?.roles.includes(to.role))
    throw new Problem('conflict', `${member.name} is ${to.role} in the shop already.`)
}

/** The invitations that wait, of a shop (for its managers) or a vessel (for who may invite to it). */
export async function listInvitations(
  who: Who,
  of: { shop?: string | undefined; vessel?: string | undefined },
): Promise<List<Invitation>> {
  const place = of.shop !== undefined ? { shopId: of.shop } : { vesselId: of.vessel ?? '' }
  await requireInviter(who, { shopId: null, vesselId: null, ...place })
  const rows = await asIngest((trx) => readWaitingInvitations(trx, place))
  return { items: rows.map(onWire), next: null }
}

/** Sends it anew with a new secret and a new term; the earlier mail's link no longer works. */
export async function resendInvitation(who: Who, id: string, from: string, now: Date): Promise<Invitation> {
  const invitation = await requireOwnInvitation(who, id)
  await countMail(invitation.email, from)
  return asIngest(async (trx) => {
    if (!(await withdraw(trx, id, now))) throw noLonger()
    const newId = await sendInvitation(trx, { ...invitation, invitedBy: who.personId }, now)
    await note(trx, who, invitation, 'invitation.sent', now)
    return read(trx, newId)
  })
}

export async function withdrawInvitation(who: Who, id: string, now: Date): Promise<{ done: true }> {
  const invitation = await requireOwnInvitation(who, id)
  return asIngest(async (trx) => {
    if (!(await withdraw(trx, id, now))) throw noLonger()
    await note(trx, who, invitation, 'invitation.withdrawn', now)
    return { done: true as const }
  })
}

const noLonger = (): Problem =>
  new Problem('conflict', 'This invitation was accepted or withdrawn meanwhile.')

async function requireOwnInvitation(who: Who, id: string): Promise<InvitationRow> {
  const invitation = await asIngest((trx) => readInvitation(trx, id))
  if (invitation === null) throw noSuch('invitation')
  try {
    await requireInviter(who, invitation)
  } catch (error) {
    // A shop or vessel that is out of sight hides its invitations too.
    if (error instanceof Problem && error.status === 404) throw noSuch('invitation')
    throw error
  }
  return invitation
}

async function note(
  trx: Trx,
  who: Who,
  to: { email: string; shopId: string | null; vesselId: string | null; role: string | null },
  action: string,
  now: Date,
): Promise<void> {
  await noteAudit(trx, {
    at: now,
    personId: who.personId,
    shopId: to.shopId ?? undefined,
    vesselId: to.vesselId ?? undefined,
    action,
    detail: { email: to.email, role: to.role },
  })
}

async function read(trx: Trx, id: string): Promise<Invitation> {
  const row = await readInvitation(trx, id)
  if (row === null) throw noSuch('invitation')
  return onWire(row)
}

const onWire = (row: InvitationRow): Invitation => ({
  id: row.id,
  email: row.email,
  shopId: row.shopId,
  role: row.role,
  vesselId: row.vesselId,
  vesselName: row.vesselName,
  invitedBy: row.inviterName,
  createdAt: row.createdAt.toISOString(),
  expiresAt: row.expiresAt.toISOString(),
  acceptedAt: row.acceptedAt?.toISOString() ?? null,
  withdrawnAt: row.withdrawnAt?.toISOString() ?? null,
})
