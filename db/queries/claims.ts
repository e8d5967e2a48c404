import type { Trx } from '@/db/roles'

export interface ClaimRow {
  id: string
  userCode: string
  serial: string
  expiresAt: Date
  intervalSeconds: number
  lastPolledAt: Date | null
  approvedBy: string | null
  systemId: string | null
  loggerId: string | null
  deniedAt: Date | null
  grantedAt: Date | null
}

const COLUMNS = {
  id: 'id',
  userCode: 'user_code',
  serial: 'serial',
  expiresAt: 'expires_at',
  intervalSeconds: 'interval_seconds',
  lastPolledAt: 'last_polled_at',
  approvedBy: 'approved_by',
  systemId: 'system_id',
  loggerId: 'logger_id',
  deniedAt: 'denied_at',
  grantedAt: 'granted_at',
}

/** @returns false when the user code is taken at the moment: make another */
export async function insertClaim(
  trx: Trx,
  claim: {
    deviceCodeHash: Buffer
    userCode: string
    serial: string
    createdAt: Date
    expiresAt: Date
    intervalSeconds: number
  },
): Promise<boolean> {
  // A code is short, so that of a claim long over may be used again.
  await trx('device_claim')
    .where({ user_code: claim.userCode })
    .where('expires_at', '<', claim.createdAt)
    .delete()
  const rows = await trx('device_claim')
    .insert({
      device_code_hash: claim.deviceCodeHash,
      user_code: claim.userCode,
      serial: claim.serial,
      created_at: claim.createdAt,
      expires_at: claim.expiresAt,
      interval_seconds: claim.intervalSeconds,
    })
    .onConflict('user_code')
    .ignore()
    .returning<{ id: string }[]>('id')
  return rows.length > 0
}

/** Locked until the end of the transaction. */
export async function lockClaimByDevice(trx: Trx, deviceCodeHash: Buffer): Promise<ClaimRow | null> {
  const row = await trx('device_claim')
    .where({ device_code_hash: deviceCodeHash })
    .forUpdate()
    .first<ClaimRow | undefined>(COLUMNS)
  return row === undefined ? null : withTextIds(row)
}

/** Locked until the end of the transaction. */
export async function lockClaimByUserCode(trx: Trx, userCode: string): Promise<ClaimRow | null> {
  const row = await trx('device_claim')
    .where({ user_code: userCode })
    .forUpdate()
    .first<ClaimRow | undefined>(COLUMNS)
  return row === undefined ? null : withTextIds(row)
}

const withTextIds = (row: ClaimRow): ClaimRow => ({
  ...row,
  loggerId: row.loggerId === null ? null : String(row.loggerId),
})

export async function notePoll(trx: Trx, claimId: string, at: Date, intervalSeconds: number): Promise<void> {
  await trx('device_claim')
    .where({ id: claimId })
    .update({ last_polled_at: at, interval_seconds: intervalSeconds })
}

export async function approveClaim(
  trx: Trx,
  claimId: string,
  approval: { by: string; systemId: string; loggerId: string },
): Promise<void> {
  await trx('device_claim')
    .where({ id: claimId })
    .update({ approved_by: approval.by, system_id: approval.systemId, logger_id: approval.loggerId })
}

export async function denyClaim(trx: Trx, claimId: string, at: Date): Promise<void> {
  await trx('device_claim').where({ id: claimId }).update({ denied_at: at })
}

export async function noteGranted(trx: Trx, claimId: string, at: Date): Promise<void> {
  await trx('device_claim').where({ id: claimId }).update({ granted_at: at })
}

/** When the logger was last heard; null = never. */
export async function loggerHeardAt(trx: Trx, loggerId: string): Promise<Date | null> {
  const row = await trx('logger')
    .where({ id: loggerId })
    .first<{ at: Date | null } | undefined>({ at: 'last_heard_at' })
  return row?.at ?? null
}
