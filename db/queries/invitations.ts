import type { Trx } from '@/db/roles'

export interface NewInvitation {
  email: string
  shopId: string | null
  role: 'technician' | 'installer' | 'manager' | null
  vesselId: string | null
  tokenHash: Buffer
  invitedBy: string
  createdAt: Date
  expiresAt: Date
}

export async function insertInvitation(trx: Trx, invitation: NewInvitation): Promise<string> {
  const [row] = await trx('invitation')
    .insert({
      email: invitation.email,
      shop_id: invitation.shopId,
      role: invitation.role,
      vessel_id: invitation.vesselId,
      token_hash: invitation.tokenHash,
      invited_by: invitation.invitedBy,
      created_at: invitation.createdAt,
      expires_at: invitation.expiresAt,
    })
    .returning<{ id: string }[]>('id')
  return row?.id ?? ''
}
