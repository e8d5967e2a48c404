import { createHash, randomBytes } from 'node:crypto'
import { insertInvitation } from '@/db/queries/invitations'
import type { Trx } from '@/db/roles'

const INVITATION_DAYS = 14

export const hashToken = (token: string): Buffer => createHash('sha256').update(token).digest()

/** Invites somebody to own a vessel. Answers the token, which exists nowhere else. */
export async function inviteOwner(
  trx: Trx,
  invite: { email: string; vesselId: string; invitedBy: string; now: Date },
): Promise<string> {
  const token = randomBytes(32).toString('base64url')
  await insertInvitation(trx, {
    email: invite.email,
    shopId: null,
    role: null,
    vesselId: invite.vesselId,
    tokenHash: hashToken(token),
    invitedBy: invite.invitedBy,
    createdAt: invite.now,
    expiresAt: new Date(invite.now.getTime() + INVITATION_DAYS * 86_400_000),
  })
  return token
}
