import { findPersonByEmail } from '@/db/queries/people'
import { insertSignUp } from '@/db/queries/joining'
import { asIngest } from '@/db/roles'
import { countMail } from '@/lib/auth/throttle'
import { env } from '@/lib/env'
import { queueMail } from '@/lib/messages/queue-mail'
import { requireZone } from '@/lib/vessels/require-zone'
import type { SignUp } from '@/shared/schemas'
import { LIFETIMES_MS, newSecret } from './secrets'

/**
 * Somebody wants an account, for a shop or for themselves as an owner. Whether the address has one already is told
 * to its mailbox alone: the same rows are written, a mail is queued and the answer is the same in both cases.
 * @throws Problem `invalid` for an unknown zone, `too-many-requests`
 */
export async function signUp(input: SignUp, from: string, now: Date): Promise<{ done: true }> {
  await countMail(input.email, from)
  const { secret, hash } = newSecret()
  await asIngest(async (trx) => {
    if (input.shop !== undefined) await requireZone(trx, input.shop.timeZone)
    const isKnown = (await findPersonByEmail(trx, input.email)) !== null
    await insertSignUp(trx, {
      email: input.email,
      name: input.name,
      shopName: input.shop?.name ?? null,
      harbour: input.shop?.harbour || null,
      timeZone: input.shop?.timeZone ?? null,
      tokenHash: hash,
      at: now,
      expiresAt: new Date(now.getTime() + LIFETIMES_MS.signUp),
      usedAt: isKnown ? now : null,
    })
    await queueMail(trx, { ...(isKnown ? known(input) : welcome(input, secret)), purpose: 'account' }, now)
  })
  return { done: true }
}

const welcome = (input: SignUp, secret: string) => ({
  personId: null,
  to: input.email,
  subject: 'Confirm your address',
  paragraphs: [
    input.shop === undefined
      ? 'Somebody, we think you, wants an account on Middlewatch with this address.'
      : `Somebody, we think you, wants to bring the shop ${input.shop.name} to Middlewatch with this address.`,
    'Open the link to confirm the address and choose a password. It works once, within two days. If it was not you, leave it: nothing happens.',
  ],
  action: { label: 'Confirm and choose a password', url: `${env().appUrl}/confirm/${secret}` },
})

const known = (input: SignUp) => ({
  personId: null,
  to: input.email,
  subject: 'You have an account already',
  paragraphs: [
    'Somebody, we think you, asked for an account on Middlewatch with this address. There is one already; nothing was changed.',
    input.shop === undefined
      ? 'Sign in with it. If the password is lost, have a new one sent from the sign-in page.'
      : 'Sign in with it; under Account, Start a shop brings the shop in. If the password is lost, have a new one sent from the sign-in page.',
  ],
  action: { label: 'Sign in', url: `${env().appUrl}/sign-in` },
})
