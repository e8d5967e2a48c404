import {
  deleteContact,
  insertContact,
  readContact,
  readContacts,
  updateContact,
  verifyContact as markVerified,
  type ContactRow,
} from '@/db/queries/account'
import { noteAudit } from '@/db/queries/audit'
import { countTokenTry, insertToken, newestToken, spendTokens } from '@/db/queries/tokens'
import { asIngest, type Trx } from '@/db/roles'
import { noSuch } from '@/lib/access/require-right'
import { countCode, countMail, countText } from '@/lib/auth/throttle'
import type { Who } from '@/lib/auth/who'
import { env } from '@/lib/env'
import { hashPhoneCode, LIFETIMES_MS, newPhoneCode, newSecret } from '@/lib/joining/secrets'
import { queueMail, queueText } from '@/lib/messages/queue-mail'
import { Problem } from '@/lib/problem'
import { contactSettingsSchema, type Contact, type ContactSettings, type List } from '@/shared/schemas'

const MOST_CONTACTS = 10
const MOST_TRIES = 5

/** The addresses one is told things by. */
export async function listContacts(who: Who): Promise<List<Contact>> {
  return { items: (await asIngest((trx) => readContacts(trx, who.personId))).map(onWire), next: null }
}

/** Adds an address; it is used once proven, by a code sent to a number or a link sent to a mailbox. */
export async function addContact(
  who: Who,
  input: { channel: 'email' | 'sms'; address: string },
  from: string,
  now: Date,
): Promise<Contact> {
  await countProof(who, input, from)
  return asIngest(async (trx) => {
    if ((await readContacts(trx, who.personId)).length >= MOST_CONTACTS)
      throw new Problem('conflict', `${MOST_CONTACTS} addresses are the most: remove one first.`)
    const contact = await insertContact(trx, { personId: who.personId, ...input })
    if (contact.verifiedAt === null) await sendProof(trx, who, contact, now)
    return onWire(contact)
  })
}

/** Sends the code or the link again; the earlier one no longer works. */
export async function resendProof(who: Who, id: string, from: string, now: Date): Promise<{ done: true }> {
  const contact = await asIngest((trx) => requireContact(trx, who, id))
  if (contact.verifiedAt !== null) throw new Problem('conflict', 'This address is proven already.')
  await countProof(who, contact, from)
  await asIngest((trx) => sendProof(trx, who, contact, now))
  return { done: true }
}

/** Takes the six digits that came by text. @throws Problem `invalid` for wrong ones, `gone` when a new code is needed */
export async function verifyContact(who: Who, id: string, code: string, now: Date): Promise<Contact> {
  await countCode(`phone ${who.personId}`)
  const outcome = await asIngest(async (trx) => {
    await requireContact(trx, who, id)
    const which = { personId: who.personId, purpose: 'verify-phone' as const, subject: id }
    const token = await newestToken(trx, which, now)
    if (token === null || token.tries >= MOST_TRIES) return 'gone'
    if (!token.hash.equals(hashPhoneCode(id, code))) {
      // Counted and kept, so it is told from outside the transaction.
      await countTokenTry(trx, token.hash)
      return 'wrong'
    }
    await spendTokens(trx, which, now)
    await markVerified(trx, who.personId, id, now)
    await noteAudit(trx, { at: now, personId: who.personId, action: 'contact.verified' })
    return requireContact(trx, who, id)
  })
  if (outcome === 'gone')
    throw new Problem('gone', 'That code has run out, or was tried too often. Have a new one sent.')
  if (outcome === 'wrong')
    throw new Problem('invalid', 'Those are not the digits of the last text.', {
      extensions: { errors: [{ path: 'code', message: 'does not fit' }] },
    })
  return onWire(outcome)
}

/** What is told by this address and when; or nothing more by it, until it is started again. */
export async function changeContact(
  who: Who,
  id: string,
  change: { settings?: ContactSettings | undefined; stopped?: boolean | undefined },
  now: Date,
): Promise<Contact> {
  return asIngest(async (trx) => {
    const contact = await requireContact(trx, who, id)
    const stop = change.stopped === undefined ? {} : { stoppedAt: change.stopped ? now : null }
    const consent = change.stopped === false ? { consentedAt: now } : {}
    if (change.stopped === false && contact.verifiedAt === null)
      throw new Problem('conflict', 'Prove this address first.')
    await updateContact(trx, who.personId, id, { settings: change.settings, ...stop, ...consent })
    await noteAudit(trx, {
      at: now,
      personId: who.personId,
      action: 'contact.changed',
      detail: {
        channel: contact.channel,
        ...(change.stopped === undefined ? {} : { stopped: change.stopped }),
      },
    })
    return onWire(await requireContact(trx, who, id))
  })
}

/** Forgets an address. The account's own stays: without it nobody could be told anything. */
export async function removeContact(who: Who, id: string, now: Date): Promise<{ done: true }> {
  return asIngest(async (trx) => {
    const contact = await requireContact(trx, who, id)
    if (contact.channel === 'email' && contact.address.toLowerCase() === who.email.toLowerCase())
      throw new Problem(
        'conflict',
        'This is the account’s own address: change it under Account, or stop it here.',
      )
    await deleteContact(trx, who.personId, id)
    await noteAudit(trx, { at: now, personId: who.personId, action: 'contact.removed' })
    return { done: true as const }
  })
}

async function requireContact(trx: Trx, who: Who, id: string): Promise<ContactRow> {
  const contact = await readContact(trx, who.personId, id)
  if (contact === null) throw noSuch('address')
  return contact
}

const countProof = (
  who: Who,
  to: { channel: 'email' | 'sms'; address: string },
  from: string,
): Promise<void> => (to.channel === 'sms' ? countText(to.address, who.personId) : countMail(to.address, from))

async function sendProof(trx: Trx, who: Who, contact: ContactRow, now: Date): Promise<void> {
  const { personId } = who
  const isPhone = contact.channel === 'sms'
  const purpose = isPhone ? 'verify-phone' : 'confirm-contact'
  const code = newPhoneCode()
  const { secret, hash } = newSecret()
  await spendTokens(trx, { personId, purpose, subject: contact.id }, now)
  await insertToken(trx, {
    hash: isPhone ? hashPhoneCode(contact.id, code) : hash,
    purpose,
    personId,
    subject: contact.id,
    at: now,
    expiresAt: new Date(now.getTime() + (isPhone ? LIFETIMES_MS.phoneCode : LIFETIMES_MS.confirmContact)),
  })
  if (isPhone) {
    const body = `${code} is your Middlewatch code, good for 10 minutes. Entering it agrees to warnings by text. Not you? Ignore it. Reply STOP to end texts.`
    await queueText(trx, { personId, to: contact.address, body, purpose: 'account' }, now)
    return
  }
  await queueMail(
    trx,
    {
      personId,
      to: contact.address,
      subject: 'Confirm this address for messages',
      paragraphs: [
        `${who.name} wants to be told by this address what Middlewatch hears of their boats. Open the link to agree; it works once, within a day.`,
        'If you know nothing of it, leave it: nothing is sent here.',
      ],
      action: { label: 'Confirm the address', url: `${env().appUrl}/confirm/${secret}` },
      purpose: 'account',
    },
    now,
  )
}

function onWire(row: ContactRow): Contact {
  const settings = contactSettingsSchema.safeParse(row.settings)
  return {
    id: row.id,
    channel: row.channel,
    address: row.address,
    verifiedAt: row.verifiedAt?.toISOString() ?? null,
    consentedAt: row.consentedAt?.toISOString() ?? null,
    stoppedAt: row.stoppedAt?.toISOString() ?? null,
    settings: settings.success ? settings.data : {},
  }
}
