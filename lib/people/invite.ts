import type { Trx } from '@/db/roles'
import { sendInvitation } from '@/lib/joining/send-invitation'

/** Invites somebody by mail to own a vessel, in the transaction that sets it up. */
export async function inviteOwner(
  trx: Trx,
  invite: { email: string; vesselId: string; invitedBy: string; now: Date },
): Promise<void> {
  const { email, vesselId, invitedBy, now } = invite
  await sendInvitation(trx, { email, shopId: null, role: null, vesselId, invitedBy }, now)
}
