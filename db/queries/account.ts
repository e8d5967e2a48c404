import type { Trx } from '@/db/roles'

/** Under the service's role throughout: a person's secrets and addresses are changed by services alone. */

export async function readEmail(trx: Trx, personId: string): Promise<string> {
  return (await readPersonMail(trx, personId)).email
}

export async function readPersonMail(trx: Trx, personId: string): Promise<{ name: string; email: string }> {
  const row = await trx('person')
    .where({ id: personId })
    .first<{ name: string; email: string } | undefined>('name', 'email')
  if (row === undefined) throw new Error(`there is no person ${personId}`)
  return row
}

export async function setEmail(trx: Trx, personId: string, email: string, at: Date): Promise<void> {
  await trx('person').where({ id: personId }).update({ email, email_confirmed_at: at })
}

export async function markEmailConfirmed(trx: Trx, personId: string, at: Date): Promise<void> {
  await trx('person')
    .where({ id: personId })
    .whereNull('email_confirmed_at')
    .update({ email_confirmed_at: at })
}

export async function endAllSessions(trx: Trx, personId: string, at: Date): Promise<void> {
  await trx('session').where({ person_id: personId }).whereNull('ended_at').update({ ended_at: at })
}

export interface SessionRow {
  id: string
  createdAt: Date
  lastSeenAt: Date
  userAgent: string | null
}

/** Live sessions, the one used last first. */
export async function readSessions(trx: Trx, personId: string, at: Date): Promise<SessionRow[]> {
  return trx('session')
    .where({ person_id: personId })
    .whereNull('ended_at')
    .where('expires_at', '>', at)
    .orderBy('last_seen_at', 'desc')
    .select({ id: 'id', createdAt: 'created_at', lastSeenAt: 'last_seen_at', userAgent: 'user_agent' })
}

/** Ends one session of this person. @returns false when there is no such live one */
export async function endOwnSession(trx: Trx, personId: string, id: string, at: Date): Promise<boolean> {
  const count = await trx('session')
    .where({ id, person_id: personId })
    .whereNull('ended_at')
    .update({ ended_at: at })
  return count > 0
}

export interface FactorRow {
  sealedSecret: string | null
  sealedPending: string | null
  onSince: Date | null
  lastStep: string | null
}

/** The second factor's sealed secrets, locked: a code is taken once. */
export async function lockFactor(trx: Trx, personId: string): Promise<FactorRow> {
  const row = await trx('person').where({ id: personId }).forUpdate().first<FactorRow | undefined>({
    sealedSecret: 'totp_secret',
    sealedPending: 'totp_pending',
    onSince: 'totp_on_since',
    lastStep: 'totp_last_step',
  })
  if (row === undefined) throw new Error(`there is no person ${personId}`)
  return row
}

export async function setPendingFactor(trx: Trx, personId: string, sealed: string): Promise<void> {
  await trx('person').where({ id: personId }).update({ totp_pending: sealed })
}

export async function setFactor(trx: Trx, personId: string, sealed: string | null, at: Date): Promise<void> {
  await trx('person')
    .where({ id: personId })
    .update({
      totp_secret: sealed,
      totp_pending: null,
      totp_on_since: sealed === null ? null : at,
      totp_last_step: null,
    })
}

export async function noteFactorStep(trx: Trx, personId: string, step: number): Promise<void> {
  await trx('person').where({ id: personId }).update({ totp_last_step: step })
}

/** Replaces all recovery codes by these. */
export async function setRecoveryCodes(
  trx: Trx,
  personId: string,
  hashes: Buffer[],
  at: Date,
): Promise<void> {
  await trx('recovery_code').where({ person_id: personId }).delete()
  if (hashes.length > 0)
    await trx('recovery_code').insert(hashes.map((hash) => ({ person_id: personId, hash, made_at: at })))
}

/** Uses a recovery code up. @returns false when it is none, or was used before */
export async function spendRecoveryCode(
  trx: Trx,
  personId: string,
  hash: Buffer,
  at: Date,
): Promise<boolean> {
  const count = await trx('recovery_code')
    .where({ person_id: personId, hash })
    .whereNull('used_at')
    .update({ used_at: at })
  return count > 0
}

export async function countRecoveryCodes(trx: Trx, personId: string): Promise<number> {
  const row = await trx('recovery_code')
    .where({ person_id: personId })
    .whereNull('used_at')
    .count<{ count: string }[]>()
    .first()
  return Number(row?.count ?? 0)
}

export interface ContactRow {
  id: string
  channel: 'email' | 'sms'
  address: string
  verifiedAt: Date | null
  consentedAt: Date | null
  stoppedAt: Date | null
  settings: unknown
}

const CONTACT = {
  id: 'id',
  channel: 'channel',
  address: 'address',
  verifiedAt: 'verified_at',
  consentedAt: 'consented_at',
  stoppedAt: 'stopped_at',
  settings: 'settings',
} as const

export async function readContacts(trx: Trx, personId: string): Promise<ContactRow[]> {
  return trx('contact').where({ person_id: personId }).orderBy(['channel', 'id']).select(CONTACT)
}

export async function readContact(trx: Trx, personId: string, id: string): Promise<ContactRow | null> {
  const row = await trx('contact').where({ id, person_id: personId }).first<ContactRow | undefined>(CONTACT)
  return row ?? null
}

export async function readContactAddress(trx: Trx, id: string): Promise<string | null> {
  const row = await trx('contact').where({ id }).first<{ address: string } | undefined>('address')
  return row?.address ?? null
}

/** A further address, not yet proven; one that is there already is answered as it is. */
export async function insertContact(
  trx: Trx,
  contact: { personId: string; channel: 'email' | 'sms'; address: string },
): Promise<ContactRow> {
  const { personId, channel, address } = contact
  await trx('contact').insert({ person_id: personId, channel, address }).onConflict().ignore()
  const row = await trx('contact')
    .where({ person_id: personId, channel, address })
    .first<ContactRow | undefined>(CONTACT)
  if (row === undefined) throw new Error('the contact was not inserted')
  return row
}

/** Proven and agreed to by whoever holds it. A number that said STOP stays stopped until it says START. */
export async function verifyContact(trx: Trx, personId: string, id: string, at: Date): Promise<void> {
  await trx('contact').where({ id, person_id: personId }).update({ verified_at: at, consented_at: at })
}

export async function updateContact(
  trx: Trx,
  personId: string,
  id: string,
  change: { settings?: unknown; stoppedAt?: Date | null; consentedAt?: Date },
): Promise<void> {
  const columns = {
    ...(change.settings === undefined ? {} : { settings: JSON.stringify(change.settings) }),
    ...(change.stoppedAt === undefined ? {} : { stopped_at: change.stoppedAt }),
    ...(change.consentedAt === undefined ? {} : { consented_at: change.consentedAt }),
  }
  if (Object.keys(columns).length > 0) await trx('contact').where({ id, person_id: personId }).update(columns)
}

export async function deleteContact(trx: Trx, personId: string, id: string): Promise<boolean> {
  return (await trx('contact').where({ id, person_id: personId }).delete()) > 0
}

/** The account's own address among the contacts follows a change of it; what was chosen for it stays. */
export async function changeContactAddress(
  trx: Trx,
  personId: string,
  from: string,
  to: string,
  at: Date,
): Promise<void> {
  await trx('contact').where({ person_id: personId, channel: 'email', address: to }).delete()
  const changed = await trx('contact')
    .where({ person_id: personId, channel: 'email' })
    .whereRaw('lower(address) = lower(?)', [from])
    .update({ address: to, verified_at: at, stopped_at: null })
  if (changed === 0)
    await trx('contact').insert({
      person_id: personId,
      channel: 'email',
      address: to,
      verified_at: at,
      consented_at: at,
    })
}
