import {
  acceptVessel,
  findInvitation,
  noteAccepted,
  withdrawAllTo,
  type InvitationRow,
} from '@/db/queries/invitations'
import { noteAudit } from '@/db/queries/audit'
import { addMembership, insertPerson, spendSignUps } from '@/db/queries/joining'
import { findPersonByEmail } from '@/db/queries/people'
import { grantAccess } from '@/db/queries/vessels'
import { asIngest, type Trx } from '@/db/roles'
import { hashPassword } from '@/lib/auth/passwords'
import { countGuess } from '@/lib/auth/throttle'
import type { Who } from '@/lib/auth/who'
import { Problem } from '@/lib/problem'
import type { AcceptInvitation, InvitationTo } from '@/shared/schemas'
import { deadLink } from './confirm'
import { hashSecret } from './secrets'

/** What the link invites to, or null where it leads nowhere. Changes nothing: mail scanners follow links. */
export async function lookAtInvitation(secret: string, now: Date): Promise<InvitationTo | null> {
  return asIngest(async (trx) => {
    const invitation = await findInvitation(trx, hashSecret(secret), now, false)
    if (invitation === null) return null
    return {
      email: invitation.email,
      shopName: invitation.shopName,
      role: invitation.role,
      vesselName: invitation.vesselName,
      keptBy: invitation.keptByShopName,
      invitedBy: invitation.inviterName,
      expiresAt: invitation.expiresAt.toISOString(),
      hasAccount: (await findPersonByEmail(trx, invitation.email)) !== null,
    }
  })
}

/** The same for programs. @throws Problem `gone` */
export async function readInvitationTo(secret: string, from: string, now: Date): Promise<InvitationTo> {
  const found = await lookAtInvitation(secret, now)
  if (found !== null) return found
  await countGuess('invitation', from)
  throw deadLink()
}

/**
 * Accepts for the person it was sent to: signed in as them, or nobody yet, who then names themselves and chooses a
 * password (having the mail proves the address).
 * @throws Problem `gone`, `not-allowed` for somebody else, `not-signed-in` where there is an account to sign in to
 */
export async function acceptInvitation(
  who: Who | null,
  input: AcceptInvitation,
  from: string,
  now: Date,
): Promise<{ vesselId: string | null; shopId: string | null; newAccount: boolean; email: string }> {
  const seen = await readInvitationTo(input.token, from, now)
  if (who !== null && who.email.toLowerCase() !== seen.email.toLowerCase())
    throw new Problem(
      'not-allowed',
      `This invitation is for ${seen.email}, and you are signed in as ${who.email}. Sign out, then open the link again.`,
    )
  if (who === null && seen.hasAccount)
    throw new Problem('not-signed-in', `Sign in as ${seen.email} first, then accept.`)
  const passwordHash = who === null ? await newPassword(input) : null
  return asIngest(async (trx) => {
    const invitation = await findInvitation(trx, hashSecret(input.token), now, true)
    if (invitation === null) throw deadLink()
    const personId = who?.personId ?? (await newPerson(trx, invitation, input.name, passwordHash, now))
    await noteAccepted(trx, invitation.id, now)
    await joinShop(trx, invitation, personId, now)
    await joinVessel(trx, invitation, personId, input.keepShop ?? 'figures', now)
    return {
      vesselId: invitation.vesselId,
      shopId: invitation.shopId,
      newAccount: who === null,
      email: invitation.email,
    }
  })
}

async function newPassword(input: AcceptInvitation): Promise<string> {
  const missing = [
    ...(input.name === undefined ? [{ path: 'name', message: 'is missing' }] : []),
    ...(input.password === undefined ? [{ path: 'password', message: 'is missing' }] : []),
  ]
  if (input.password === undefined || missing.length > 0)
    throw new Problem('invalid', 'Give your name and choose a password of at least 10 characters.', {
      extensions: { errors: missing },
    })
  return hashPassword(input.password)
}

async function newPerson(
  trx: Trx,
  invitation: InvitationRow,
  name: string | undefined,
  passwordHash: string | null,
  now: Date,
): Promise<string> {
  if (name === undefined || passwordHash === null) throw new Error('a new person needs a name and a password')
  const { email } = invitation
  const personId = await insertPerson(trx, { email, name, passwordHash, at: now })
  // Somebody made the account in this very moment.
  if (personId === null) throw new Problem('not-signed-in', `Sign in as ${email} first, then accept.`)
  await spendSignUps(trx, email, now)
  await noteAudit(trx, { at: now, personId, action: 'account.made' })
  return personId
}

async function joinShop(trx: Trx, to: InvitationRow, personId: string, now: Date): Promise<void> {
  const { shopId, role } = to
  if (shopId === null || role === null) return
  await addMembership(trx, { shopId, personId, role, at: now })
  await noteAudit(trx, { at: now, personId, shopId, action: 'person.joined', detail: { role } })
}

async function joinVessel(
  trx: Trx,
  to: InvitationRow,
  personId: string,
  keepShop: 'none' | 'figures' | 'full',
  now: Date,
): Promise<void> {
  const { vesselId, keptByShopId: shopId } = to
  if (vesselId === null) return
  await acceptVessel(trx, vesselId, personId, now)
  await noteAudit(trx, { at: now, personId, vesselId, shopId: shopId ?? undefined, action: 'owner.joined' })
  if (shopId === null) return
  // The shop speaks for the boat no longer: what it sent to others before ends.
  await withdrawAllTo(trx, vesselId, now)
  if (keepShop === 'none') return
  await grantAccess(trx, { vesselId, shopId, level: keepShop, grantedBy: personId, at: now })
  await noteAudit(trx, {
    at: now,
    personId,
    vesselId,
    shopId,
    action: 'access.given',
    detail: { level: keepShop },
  })
}
