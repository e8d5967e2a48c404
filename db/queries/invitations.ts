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

export interface InvitationRow {
  id: string
  email: string
  shopId: string | null
  shopName: string | null
  role: 'technician' | 'installer' | 'manager' | null
  vesselId: string | null
  vesselName: string | null
  /** The shop that keeps the vessel until an owner accepts. */
  keptByShopId: string | null
  keptByShopName: string | null
  invitedBy: string | null
  inviterName: string | null
  createdAt: Date
  expiresAt: Date
  acceptedAt: Date | null
  withdrawnAt: Date | null
}

const SELECT = `
  select i.id, i.email::text as email, i.shop_id as "shopId", s.name as "shopName", i.role, i.vessel_id as "vesselId",
    v.name as "vesselName", v.kept_by_shop_id as "keptByShopId", k.name as "keptByShopName", i.invited_by as "invitedBy",
    p.name as "inviterName", i.created_at as "createdAt", i.expires_at as "expiresAt", i.accepted_at as "acceptedAt",
    i.withdrawn_at as "withdrawnAt"
  from invitation i left join shop s on s.id = i.shop_id left join vessel v on v.id = i.vessel_id
    left join shop k on k.id = v.kept_by_shop_id left join person p on p.id = i.invited_by`

/** The open invitation behind a link. With `lock`, nobody else can accept it until the transaction ends. */
export async function findInvitation(
  trx: Trx,
  tokenHash: Buffer,
  at: Date,
  lock: boolean,
): Promise<InvitationRow | null> {
  const { rows } = await trx.raw<{ rows: InvitationRow[] }>(
    `${SELECT} where i.token_hash = :hash and i.accepted_at is null and i.withdrawn_at is null
       and i.expires_at > :at ${lock ? 'for update of i' : ''}`,
    { hash: tokenHash, at },
  )
  return rows[0] ?? null
}

export async function readInvitation(trx: Trx, id: string): Promise<InvitationRow | null> {
  const { rows } = await trx.raw<{ rows: InvitationRow[] }>(`${SELECT} where i.id = ?`, [id])
  return rows[0] ?? null
}

/** Invitations into a shop and to the vessels it keeps, or to one vessel, that still wait, the newest first. */
export async function readWaitingInvitations(
  trx: Trx,
  of: { shopId: string } | { vesselId: string },
): Promise<InvitationRow[]> {
  const [where, id] =
    'shopId' in of
      ? ['(i.shop_id = :id or v.kept_by_shop_id = :id)', of.shopId]
      : ['i.vessel_id = :id', of.vesselId]
  const { rows } = await trx.raw<{ rows: InvitationRow[] }>(
    `${SELECT} where ${where} and i.accepted_at is null and i.withdrawn_at is null order by i.created_at desc, i.id`,
    { id },
  )
  return rows
}

/** Takes back what was sent before to the same address for the same thing: of several mails only the last works. */
export async function withdrawSame(
  trx: Trx,
  same: { email: string; shopId: string | null; vesselId: string | null; role?: string | null },
  at: Date,
): Promise<void> {
  const open = trx('invitation')
    .where({ email: same.email })
    .whereRaw('shop_id is not distinct from cast(? as bigint)', [same.shopId])
    .whereRaw('vessel_id is not distinct from cast(? as bigint)', [same.vesselId])
    .whereNull('accepted_at')
    .whereNull('withdrawn_at')
  if (same.role !== undefined) void open.whereRaw('role is not distinct from cast(? as text)', [same.role])
  await open.update({ withdrawn_at: at })
}

export async function withdrawInvitation(trx: Trx, id: string, at: Date): Promise<boolean> {
  const count = await trx('invitation')
    .where({ id })
    .whereNull('accepted_at')
    .whereNull('withdrawn_at')
    .update({ withdrawn_at: at })
  return count > 0
}

export async function noteAccepted(trx: Trx, id: string, at: Date): Promise<void> {
  await trx('invitation').where({ id }).update({ accepted_at: at })
}

/** Makes a person an owner of a vessel; the shop that kept it keeps it no longer. @returns false when they were one */
export async function acceptVessel(trx: Trx, vesselId: string, personId: string, at: Date): Promise<boolean> {
  await trx('vessel').where({ id: vesselId }).forUpdate().first('id')
  const owns = await trx('vessel_owner')
    .where({ vessel_id: vesselId, person_id: personId })
    .whereNull('ended_at')
    .first('person_id')
  if (owns === undefined)
    await trx('vessel_owner').insert({ vessel_id: vesselId, person_id: personId, since: at })
  await trx('vessel').where({ id: vesselId }).update({ kept_by_shop_id: null })
  return owns === undefined
}

/** Takes back every invitation to a vessel that still waits. */
export async function withdrawAllTo(trx: Trx, vesselId: string, at: Date): Promise<void> {
  await trx('invitation')
    .where({ vessel_id: vesselId })
    .whereNull('accepted_at')
    .whereNull('withdrawn_at')
    .update({ withdrawn_at: at })
}
