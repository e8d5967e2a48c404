import type { Trx } from '@/db/roles'

export interface Credentials {
  personId: string
  name: string
  email: string
  passwordHash: string | null
  /** A code is asked for besides the password. */
  secondFactor: boolean
}

const CREDENTIALS = (trx: Trx) => ({
  personId: 'id',
  name: 'name',
  email: trx.raw('email::text'),
  passwordHash: 'password_hash',
  secondFactor: trx.raw('totp_on_since is not null'),
})

/** What sign-in compares against; under the service's role, since nobody reads password hashes. */
export async function readCredentials(trx: Trx, email: string): Promise<Credentials | null> {
  const row: unknown = await trx('person').where({ email }).whereNull('deleted_at').first(CREDENTIALS(trx))
  return (row ?? null) as Credentials | null // columns named as the type just above
}

export async function readCredentialsById(trx: Trx, personId: string): Promise<Credentials | null> {
  const row: unknown = await trx('person')
    .where({ id: personId })
    .whereNull('deleted_at')
    .first(CREDENTIALS(trx))
  return (row ?? null) as Credentials | null // columns named as the type above
}

export async function setPasswordHash(trx: Trx, personId: string, passwordHash: string): Promise<void> {
  await trx('person').where({ id: personId }).update({ password_hash: passwordHash })
}

/** The id of the person with this address, or null. */
export async function findPersonByEmail(trx: Trx, email: string): Promise<string | null> {
  const row = await trx('person').where({ email }).whereNull('deleted_at').first<{ id: string }>('id')
  return row?.id ?? null
}

export async function changePerson(
  trx: Trx,
  personId: string,
  change: { name?: string | undefined; units?: Record<string, unknown> | undefined },
): Promise<void> {
  const columns = {
    ...(change.name === undefined ? {} : { name: change.name }),
    ...(change.units === undefined ? {} : { units: JSON.stringify(change.units) }),
  }
  if (Object.keys(columns).length > 0) await trx('person').where({ id: personId }).update(columns)
}

export interface OwnShop {
  id: string
  name: string
  harbour: string | null
  timeZone: string
  roles: string[]
}

/** One's shops with one's roles in each, and one's own vessels by name. */
export async function readOwnPlaces(
  trx: Trx,
  personId: string,
): Promise<{ shops: OwnShop[]; ownVessels: { id: string; name: string }[] }> {
  const { rows: shops } = await trx.raw<{ rows: OwnShop[] }>(
    `select s.id, s.name, s.harbour, s.time_zone as "timeZone", array_agg(m.role order by m.role) as roles
     from membership m join shop s on s.id = m.shop_id
     where m.person_id = ? and m.ended_at is null group by s.id order by s.name`,
    [personId],
  )
  const ownVessels = await trx('vessel_owner as o')
    .join('vessel as v', 'v.id', 'o.vessel_id')
    .where({ 'o.person_id': personId })
    .whereNull('o.ended_at')
    .orderBy('v.name')
    .select<{ id: string; name: string }[]>('v.id', 'v.name')
  return { shops, ownVessels }
}

/** Names by id of those among these people whom the role may know of. */
export async function namesSeen(trx: Trx, personIds: readonly string[]): Promise<Map<string, string>> {
  const rows = await trx('person')
    .whereIn('id', [...new Set(personIds)])
    .select<{ id: string; name: string }[]>('id', 'name')
  return new Map(rows.map((row) => [row.id, row.name]))
}
