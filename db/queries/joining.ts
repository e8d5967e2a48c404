import type { Trx } from '@/db/roles'

export interface SignUp {
  id: string
  email: string
  name: string
  shopName: string | null
  harbour: string | null
  timeZone: string | null
}

/** Keeps what was asked for; `usedAt` is set at once where the mail holds no link. */
export async function insertSignUp(
  trx: Trx,
  signUp: Omit<SignUp, 'id'> & { tokenHash: Buffer; at: Date; expiresAt: Date; usedAt: Date | null },
): Promise<void> {
  await trx('sign_up').insert({
    email: signUp.email,
    name: signUp.name,
    shop_name: signUp.shopName,
    harbour: signUp.harbour,
    time_zone: signUp.timeZone,
    token_hash: signUp.tokenHash,
    created_at: signUp.at,
    expires_at: signUp.expiresAt,
    used_at: signUp.usedAt,
  })
}

/** The open request behind a link. With `lock`, nobody else can act on it until the transaction ends. */
export async function findSignUp(
  trx: Trx,
  tokenHash: Buffer,
  at: Date,
  lock: boolean,
): Promise<SignUp | null> {
  const { rows } = await trx.raw<{ rows: SignUp[] }>(
    `select id, email::text as email, name, shop_name as "shopName", harbour, time_zone as "timeZone"
     from sign_up where token_hash = :hash and used_at is null and expires_at > :at ${lock ? 'for update' : ''}`,
    { hash: tokenHash, at },
  )
  return rows[0] ?? null
}

/** Uses up every open request of an address: the account is there now. */
export async function spendSignUps(trx: Trx, email: string, at: Date): Promise<void> {
  await trx('sign_up').where({ email }).whereNull('used_at').update({ used_at: at })
}

/** A new person whose address is proven, told things by that address. @returns the id, or null when it is taken. */
export async function insertPerson(
  trx: Trx,
  person: { email: string; name: string; passwordHash: string; at: Date },
): Promise<string | null> {
  const [row] = await trx('person')
    .insert({
      email: person.email,
      name: person.name,
      password_hash: person.passwordHash,
      email_confirmed_at: person.at,
      created_at: person.at,
    })
    .onConflict('email')
    .ignore()
    .returning<{ id: string }[]>('id')
  if (row === undefined) return null
  await trx('contact').insert({
    person_id: row.id,
    channel: 'email',
    address: person.email,
    verified_at: person.at,
    consented_at: person.at,
  })
  return row.id
}

export async function insertShop(
  trx: Trx,
  shop: { name: string; harbour: string | null; timeZone: string; at: Date },
): Promise<string> {
  const [row] = await trx('shop')
    .insert({ name: shop.name, harbour: shop.harbour, time_zone: shop.timeZone, created_at: shop.at })
    .returning<{ id: string }[]>('id')
  if (row === undefined) throw new Error('the shop was not inserted')
  return row.id
}

/** A role in a shop; one that is held already stays as it is. */
export async function addMembership(
  trx: Trx,
  membership: { shopId: string; personId: string; role: string; at: Date },
): Promise<void> {
  await trx('membership')
    .insert({
      shop_id: membership.shopId,
      person_id: membership.personId,
      role: membership.role,
      since: membership.at,
    })
    .onConflict(trx.raw('(shop_id, person_id, role) where ended_at is null'))
    .ignore()
}

export async function endMemberships(
  trx: Trx,
  which: { shopId: string; personId: string; roles: readonly string[] },
  at: Date,
): Promise<void> {
  await trx('membership')
    .where({ shop_id: which.shopId, person_id: which.personId })
    .whereIn('role', which.roles)
    .whereNull('ended_at')
    .update({ ended_at: trx.raw('greatest(cast(? as timestamptz), since)', [at]) })
  await trx('shop')
    .where({ id: which.shopId, on_call_id: which.personId })
    .whereNotExists((query) => {
      void query
        .select('id')
        .from('membership')
        .where({ shop_id: which.shopId, person_id: which.personId })
        .whereNull('ended_at')
    })
    .update({ on_call_id: null })
}

/** Lets nobody else change who is in the shop until the transaction ends. */
export async function lockShop(trx: Trx, shopId: string): Promise<void> {
  await trx('shop').where({ id: shopId }).forUpdate().first('id')
}

export interface Member {
  personId: string
  name: string
  email: string
  roles: string[]
  since: Date
}

/** Who is in the shop, by name. */
export async function readMembers(trx: Trx, shopId: string): Promise<Member[]> {
  const { rows } = await trx.raw<{ rows: Member[] }>(
    `select p.id as "personId", p.name, p.email::text as email, array_agg(m.role order by m.role) as roles,
       min(m.since) as since
     from membership m join person p on p.id = m.person_id
     where m.shop_id = ? and m.ended_at is null group by p.id order by p.name, p.id`,
    [shopId],
  )
  return rows
}

export interface ShopRow {
  id: string
  name: string
  harbour: string | null
  timeZone: string
  toldKinds: string[] | null
  quietStart: string
  quietEnd: string
  onCallId: string | null
}

export async function readShop(trx: Trx, shopId: string): Promise<ShopRow | null> {
  const { rows } = await trx.raw<{ rows: ShopRow[] }>(
    `select id, name, harbour, time_zone as "timeZone", told_kinds as "toldKinds",
       to_char(quiet_start, 'HH24:MI') as "quietStart", to_char(quiet_end, 'HH24:MI') as "quietEnd",
       on_call_id as "onCallId"
     from shop where id = ?`,
    [shopId],
  )
  return rows[0] ?? null
}

export async function updateShop(
  trx: Trx,
  shopId: string,
  change: { [Column in keyof Omit<ShopRow, 'id'>]?: ShopRow[Column] | undefined },
): Promise<void> {
  const columns = Object.entries({
    name: change.name,
    harbour: change.harbour,
    time_zone: change.timeZone,
    told_kinds: change.toldKinds,
    quiet_start: change.quietStart,
    quiet_end: change.quietEnd,
    on_call_id: change.onCallId,
  }).filter(([, value]) => value !== undefined)
  if (columns.length > 0) await trx('shop').where({ id: shopId }).update(Object.fromEntries(columns))
}

/** Blanks mails and texts of accounts that left before an instant: their one-time secrets are with the receiver now. */
export async function forgetAccountBodies(trx: Trx, sentBefore: Date): Promise<number> {
  return trx('message')
    .where({ purpose: 'account' })
    .where('accepted_at', '<', sentBefore)
    .whereNot({ body_text: '' })
    .update({ body_text: '', body_html: null })
}
