import type { Trx } from '@/db/roles'

export type TokenPurpose = 'change-email' | 'confirm-contact' | 'reset-password' | 'verify-phone'

export interface TokenRow {
  hash: Buffer
  purpose: TokenPurpose
  personId: string | null
  subject: string | null
  tries: number
}

/** Keeps the hash of a one-time secret. Without a person it opens nothing: made only so that time tells nothing. */
export async function insertToken(
  trx: Trx,
  token: {
    hash: Buffer
    purpose: TokenPurpose
    personId: string | null
    subject: string | null
    at: Date
    expiresAt: Date
  },
): Promise<void> {
  await trx('token').insert({
    hash: token.hash,
    purpose: token.purpose,
    person_id: token.personId,
    subject: token.subject,
    created_at: token.at,
    expires_at: token.expiresAt,
  })
}

const COLUMNS = {
  hash: 'hash',
  purpose: 'purpose',
  personId: 'person_id',
  subject: 'subject',
  tries: 'tries',
} as const

/** The unused, unexpired token of a living person; with `lock` it is this transaction's alone. */
export async function findToken(
  trx: Trx,
  hash: Buffer,
  purposes: readonly TokenPurpose[],
  at: Date,
  lock: boolean,
): Promise<(TokenRow & { personId: string }) | null> {
  const query = trx('token')
    .where({ hash })
    .whereIn('purpose', [...purposes])
    .whereNull('used_at')
    .where('expires_at', '>', at)
    .whereIn('person_id', trx('person').whereNull('deleted_at').select('id'))
    .first<TokenRow | undefined>(COLUMNS)
  const row = await (lock ? query.forUpdate() : query)
  return row === undefined || row.personId === null ? null : { ...row, personId: row.personId }
}

/** The newest open code for a subject of a person, locked: for secrets too short to be looked up by. */
export async function newestToken(
  trx: Trx,
  which: { personId: string; purpose: TokenPurpose; subject: string },
  at: Date,
): Promise<TokenRow | null> {
  const row = await trx('token')
    .where({ person_id: which.personId, purpose: which.purpose, subject: which.subject })
    .whereNull('used_at')
    .where('expires_at', '>', at)
    .orderBy('created_at', 'desc')
    .forUpdate()
    .first<TokenRow | undefined>(COLUMNS)
  return row ?? null
}

export async function countTokenTry(trx: Trx, hash: Buffer): Promise<void> {
  await trx('token').where({ hash }).increment('tries', 1)
}

/** Uses up all open tokens of a purpose, so that of several mails only one works, and it once. */
export async function spendTokens(
  trx: Trx,
  which: { personId: string; purpose: TokenPurpose; subject?: string },
  at: Date,
): Promise<void> {
  const open = trx('token').where({ person_id: which.personId, purpose: which.purpose }).whereNull('used_at')
  if (which.subject !== undefined) void open.where({ subject: which.subject })
  await open.update({ used_at: at })
}
