import { hash } from '@node-rs/argon2'
import type { Knex } from 'knex'

interface DemoPerson {
  email: string
  name: string
  role?: 'technician' | 'installer' | 'manager'
  /** From the range kept for fiction. */
  phone?: string
}
interface DemoShop {
  name: string
  harbour: string
  timeZone: string
  people: DemoPerson[]
}

/** All invented. */
const SHOPS: DemoShop[] = [
  {
    name: 'Saltern Quay Marine Sanitation',
    harbour: 'Port Averill',
    timeZone: 'America/New_York',
    people: [
      { email: 'manager@saltern.example', name: 'Marit Sandhaven', role: 'manager', phone: '+12025550111' },
      {
        email: 'technician@saltern.example',
        name: 'Tobin Reedmace',
        role: 'technician',
        phone: '+12025550112',
      },
      {
        email: 'installer@saltern.example',
        name: 'Ines Kelpwright',
        role: 'installer',
        phone: '+12025550113',
      },
    ],
  },
  {
    name: 'Stranger Sound Boat Plumbing',
    harbour: 'Grey Sound',
    timeZone: 'America/New_York',
    people: [
      { email: 'manager@stranger.example', name: 'Milo Outerbank', role: 'manager', phone: '+12025550121' },
    ],
  },
]
const OWNERS: DemoPerson[] = [
  { email: 'owner@saltern.example', name: 'Orla Quayle', phone: '+12025550131' },
  { email: 'owner@stranger.example', name: 'Oswin Farrow', phone: '+12025550132' },
]

/**
 * Shops and people of the demo, with verified addresses. Safe to run again: what is there stays, the password
 * follows the one given. Vessels come over the API, as everywhere.
 */
export async function seedDemo(knex: Knex, password: string): Promise<void> {
  const passwordHash = await hash(password)
  await knex.transaction(async (trx) => {
    // Two starts at once would both find no shop.
    await trx.raw("select pg_advisory_xact_lock(hashtext('middlewatch demo seed'))")
    for (const shop of SHOPS) {
      const shopId = await shopNamed(trx, shop)
      for (const person of shop.people) {
        const personId = await personWith(trx, person, passwordHash)
        if (person.role !== undefined)
          await trx.raw(
            `insert into membership (shop_id, person_id, role) values (?, ?, ?)
             on conflict (shop_id, person_id, role) where ended_at is null do nothing`,
            [shopId, personId, person.role],
          )
      }
    }
    for (const owner of OWNERS) await personWith(trx, owner, passwordHash)
  })
}

async function shopNamed(trx: Knex.Transaction, shop: DemoShop): Promise<string> {
  const known = await trx('shop').where({ name: shop.name }).first<{ id: string }>('id')
  if (known !== undefined) return known.id
  const [made] = await trx('shop')
    .insert({ name: shop.name, harbour: shop.harbour, time_zone: shop.timeZone })
    .returning<{ id: string }[]>('id')
  return made?.id ?? ''
}

async function personWith(trx: Knex.Transaction, person: DemoPerson, passwordHash: string): Promise<string> {
  const now = new Date()
  const [row] = await trx('person')
    .insert({
      email: person.email,
      name: person.name,
      password_hash: passwordHash,
      email_confirmed_at: now,
    })
    .onConflict('email')
    .merge({ password_hash: passwordHash })
    .returning<{ id: string }[]>('id')
  const personId = row?.id ?? ''
  const contacts = [
    { channel: 'email', address: person.email },
    ...(person.phone === undefined ? [] : [{ channel: 'sms', address: person.phone }]),
  ]
  await trx('contact')
    .insert(
      contacts.map((contact) => ({
        ...contact,
        person_id: personId,
        verified_at: now,
        consented_at: now,
      })),
    )
    .onConflict(['person_id', 'channel', 'address'])
    .ignore()
  return personId
}
