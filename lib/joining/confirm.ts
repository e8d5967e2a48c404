import {
  changeContactAddress,
  readContactAddress,
  readEmail,
  setEmail,
  verifyContact,
} from '@/db/queries/account'
import { noteAudit } from '@/db/queries/audit'
import { addMembership, findSignUp, insertPerson, insertShop, spendSignUps } from '@/db/queries/joining'
import { findPersonByEmail } from '@/db/queries/people'
import { findToken, spendTokens, type TokenPurpose } from '@/db/queries/tokens'
import { asIngest } from '@/db/roles'
import { countGuess } from '@/lib/auth/throttle'
import { hashPassword } from '@/lib/auth/passwords'
import { queueMail } from '@/lib/messages/queue-mail'
import { Problem } from '@/lib/problem'
import type { Confirmation } from '@/shared/schemas'
import { hashSecret } from './secrets'

const PURPOSES: TokenPurpose[] = ['change-email', 'confirm-contact']

/** Unknown, used, run out: one answer for all, since none of them leads anywhere. */
export const deadLink = (): Problem =>
  new Problem('gone', 'This link has been used already or has run out. Ask for a new one.')

/** What a link in a mail would confirm, or null. Changes nothing: mail scanners follow links. */
export async function lookAtConfirmation(secret: string, now: Date): Promise<Confirmation | null> {
  const hash = hashSecret(secret)
  return asIngest(async (trx) => {
    const signUp = await findSignUp(trx, hash, now, false)
    if (signUp !== null) return { kind: 'sign-up', email: signUp.email, shopName: signUp.shopName }
    const token = await findToken(trx, hash, PURPOSES, now, false)
    if (token === null || token.subject === null) return null
    if (token.purpose === 'change-email')
      return { kind: 'change-email', email: token.subject, shopName: null }
    const address = await readContactAddress(trx, token.subject)
    return address === null ? null : { kind: 'contact', email: address, shopName: null }
  })
}

/**
 * Does what the link is for: makes the account that was asked for (with the password chosen now), changes the
 * account's address, or takes a further address as proven.
 * @throws Problem `gone` for a link that leads nowhere, `invalid` when a new account has no password
 */
export async function confirm(
  input: { token: string; password?: string | undefined },
  from: string,
  now: Date,
): Promise<{ kind: Confirmation['kind']; email: string }> {
  const hash = hashSecret(input.token)
  const seen = await lookAtConfirmation(input.token, now)
  if (seen === null) {
    await countGuess('confirm', from)
    throw deadLink()
  }
  if (seen.kind === 'sign-up') return makeAccount(hash, input.password, now)
  return asIngest(async (trx) => {
    const token = await findToken(trx, hash, PURPOSES, now, true)
    if (token === null || token.subject === null) throw deadLink()
    const { personId, purpose, subject } = token
    if (purpose === 'confirm-contact') {
      await spendTokens(trx, { personId, purpose, subject }, now)
      await verifyContact(trx, personId, subject, now)
      return { kind: 'contact' as const, email: seen.email }
    }
    await spendTokens(trx, { personId, purpose }, now)
    if ((await findPersonByEmail(trx, subject)) !== null) throw deadLink()
    const before = await readEmail(trx, personId)
    await setEmail(trx, personId, subject, now)
    await changeContactAddress(trx, personId, before, subject, now)
    await noteAudit(trx, { at: now, personId, action: 'account.email' })
    const mail = {
      personId,
      to: before,
      subject: 'Your address was changed',
      paragraphs: [
        'Your Middlewatch account now goes by another address, and mail no longer comes here. If that was not you, tell us at once: answer this mail.',
      ],
      purpose: 'account' as const,
    }
    await queueMail(trx, mail, now)
    return { kind: 'change-email' as const, email: subject }
  })
}

async function makeAccount(
  hash: Buffer,
  password: string | undefined,
  now: Date,
): Promise<{ kind: 'sign-up'; email: string }> {
  if (password === undefined)
    throw new Problem('invalid', 'Choose a password of at least 10 characters.', {
      extensions: { errors: [{ path: 'password', message: 'is missing' }] },
    })
  const passwordHash = await hashPassword(password)
  return asIngest(async (trx) => {
    const signUp = await findSignUp(trx, hash, now, true)
    if (signUp === null) throw deadLink()
    const { email, name } = signUp
    const personId = await insertPerson(trx, { email, name, passwordHash, at: now })
    if (personId === null) throw deadLink()
    await spendSignUps(trx, email, now)
    await noteAudit(trx, { at: now, personId, action: 'account.made' })
    if (signUp.shopName !== null)
      await openShop(trx, {
        personId,
        name: signUp.shopName,
        harbour: signUp.harbour,
        timeZone: signUp.timeZone ?? 'Etc/UTC',
        at: now,
      })
    return { kind: 'sign-up' as const, email }
  })
}

/** A shop with its first manager. */
export async function openShop(
  trx: Parameters<typeof insertShop>[0],
  shop: { personId: string; name: string; harbour: string | null; timeZone: string; at: Date },
): Promise<string> {
  const shopId = await insertShop(trx, shop)
  await addMembership(trx, { shopId, personId: shop.personId, role: 'manager', at: shop.at })
  await noteAudit(trx, {
    at: shop.at,
    personId: shop.personId,
    shopId,
    action: 'shop.opened',
    detail: { name: shop.name },
  })
  return shopId
}
