import { randomBytes, randomUUID } from 'node:crypto'
import { nobody, signIn, type Answer, type Client } from '../support/client'
import { lastMailTo, secretIn } from '../support/mailbox'

export const PASSWORD = 'a watch below deck'
export const newEmail = (): string => `${randomUUID()}@harbour.example`

/** An address of this request's own, so that limits counted by address don't meet other tests. */
export const elsewhere = (): Record<string, string> => {
  const [a, b, c] = randomBytes(3)
  return { 'x-forwarded-for': `10.${a}.${b}.${c}` }
}

/** Posts as nobody. */
export const post = <T = { type?: string; detail?: string }>(
  path: string,
  body: object,
  headers: Record<string, string> = {},
): Promise<Answer<T>> => nobody().send<T>('POST', path, body, { ...elsewhere(), ...headers })

export interface Joined {
  email: string
  client: Client
}

/** Somebody new, all the way: asks, opens the mail, chooses a password, signs in. */
export async function join(shop?: string): Promise<Joined> {
  const email = newEmail()
  const body = {
    email,
    name: 'Wren Holm',
    ...(shop === undefined ? {} : { shop: { name: shop, harbour: 'Inner Holm', timeZone: 'Europe/Lisbon' } }),
  }
  await expectStatus(post('/api/sign-up', body), 200)
  const token = secretIn(await lastMailTo(email))
  await expectStatus(post('/api/confirm-email', { token, password: PASSWORD }), 200)
  return { email, client: await signIn(email, PASSWORD) }
}

export async function expectStatus<T>(answer: Promise<Answer<T>>, status: number): Promise<T> {
  const { status: given, body } = await answer
  if (given !== status) throw new Error(`answered ${given} instead of ${status}: ${JSON.stringify(body)}`)
  return body
}

export interface Shop extends Joined {
  shopId: string
}

/** A shop of its own with its manager. */
export async function newShop(): Promise<Shop> {
  const joined = await join(`Holm Sanitation ${randomUUID().slice(0, 8)}`)
  const me = await joined.client.get<{ shops: { id: string }[] }>('/api/me')
  return { ...joined, shopId: me.body.shops[0]?.id ?? '' }
}

/** A boat of a person's own, without a shop. */
export async function ownBoat(person: Joined): Promise<{ vesselId: string; systemId: string }> {
  const made = await expectStatus(
    person.client.send<{ id: string; systems: { id: string }[] }>('POST', '/api/vessels', {
      name: `Boat ${randomUUID().slice(0, 8)}`,
      timeZone: 'Europe/Lisbon',
      ownerEmail: person.email,
    }),
    201,
  )
  return { vesselId: made.id, systemId: made.systems[0]?.id ?? '' }
}

/** Invites somebody and answers the secret of the mail. */
export async function invited(by: Client, email: string, to: object): Promise<{ id: string; token: string }> {
  const { id } = await expectStatus(
    by.send<{ id: string }>('POST', '/api/invitations', { email, ...to }, elsewhere()),
    201,
  )
  return { id, token: secretIn(await lastMailTo(email)) }
}

/** Accepts as somebody new and signs in. */
export async function acceptAsNew(email: string, token: string, more: object = {}): Promise<Joined> {
  await expectStatus(
    post('/api/invitations/accept', { token, name: 'Rue Marram', password: PASSWORD, ...more }),
    200,
  )
  return { email, client: await signIn(email, PASSWORD) }
}

/** Runs the clock of one request forward. */
export const later = (days: number): Record<string, string> => ({
  'x-now': new Date(Date.now() + days * 86_400_000).toISOString(),
})
