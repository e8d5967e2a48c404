import { insertInvitation, readInvitation, withdrawSame, type InvitationRow } from '@/db/queries/invitations'
import type { Trx } from '@/db/roles'
import { env } from '@/lib/env'
import { queueMail } from '@/lib/messages/queue-mail'
import type { Role } from '@/shared/schemas'
import { LIFETIMES_MS, newSecret } from './secrets'

const ROLE_WORDS: Record<Role, string> = {
  technician: 'a technician',
  installer: 'an installer',
  manager: 'a manager',
}

/**
 * Writes an invitation and queues its mail, which alone holds the secret. An earlier one to the same address for
 * the same thing no longer works.
 * @param trx under the service's role, after the caller has checked that this person may invite.
 * @returns the invitation's id.
 */
export async function sendInvitation(
  trx: Trx,
  to: {
    email: string
    shopId: string | null
    role: Role | null
    vesselId: string | null
    invitedBy: string
  },
  now: Date,
): Promise<string> {
  const { secret, hash } = newSecret()
  await withdrawSame(trx, to, now)
  const id = await insertInvitation(trx, {
    ...to,
    tokenHash: hash,
    createdAt: now,
    expiresAt: new Date(now.getTime() + LIFETIMES_MS.invitation),
  })
  const invitation = await readInvitation(trx, id)
  if (invitation === null) throw new Error('the invitation was not inserted')
  await queueMail(
    trx,
    {
      personId: null,
      to: to.email,
      ...wording(invitation),
      action: { label: 'Read and accept', url: `${env().appUrl}/invitation/${secret}` },
      purpose: 'account',
    },
    now,
  )
  return id
}

function wording(invitation: InvitationRow): { subject: string; paragraphs: string[] } {
  const inviter = invitation.inviterName ?? 'Somebody'
  const end =
    'The link works once, within 14 days. If you expected nothing of the kind, leave it: nothing happens.'
  if (invitation.shopId !== null && invitation.role !== null) {
    const shop = invitation.shopName ?? 'a shop'
    return {
      subject: `Join ${shop} on Middlewatch`,
      paragraphs: [
        `${inviter} invites you to ${shop} as ${ROLE_WORDS[invitation.role]}.`,
        'Middlewatch shows the shop which boats’ vacuum toilet systems leak, and how fast.',
        end,
      ],
    }
  }
  const vessel = invitation.vesselName ?? 'your boat'
  const from = invitation.keptByShopName === null ? inviter : `${inviter} of ${invitation.keptByShopName}`
  return {
    subject: `Take over the watch on ${vessel}`,
    paragraphs: [
      `${from} invites you to be an owner of ${vessel} on Middlewatch.`,
      'It tells you before a night in which the toilet pump will run by itself. As the owner you decide who may see the boat, and can change your mind at any time.',
      end,
    ],
  }
}
