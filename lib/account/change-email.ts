import { noteAudit } from '@/db/queries/audit'
import { findPersonByEmail } from '@/db/queries/people'
import { insertToken, spendTokens } from '@/db/queries/tokens'
import { asIngest } from '@/db/roles'
import { countMail } from '@/lib/auth/throttle'
import type { Who } from '@/lib/auth/who'
import { env } from '@/lib/env'
import { LIFETIMES_MS, newSecret } from '@/lib/joining/secrets'
import { queueMail } from '@/lib/messages/queue-mail'
import { requirePassword } from './require-password'

/**
 * Sends a link to the new address; the account goes by it once that is acted on. Whether somebody else's account
 * has the address is told to its mailbox alone.
 * @throws Problem `invalid` for a wrong password, `too-many-requests`
 */
export async function changeEmail(
  who: Who,
  input: { email: string; password: string },
  from: string,
  now: Date,
): Promise<{ done: true }> {
  await requirePassword(who, input.password)
  await countMail(input.email, from)
  const { secret, hash } = newSecret()
  return asIngest(async (trx) => {
    const isFree = (await findPersonByEmail(trx, input.email)) === null
    await spendTokens(trx, { personId: who.personId, purpose: 'change-email' }, now)
    await insertToken(trx, {
      hash,
      purpose: 'change-email',
      personId: who.personId,
      subject: input.email,
      at: now,
      expiresAt: new Date(now.getTime() + LIFETIMES_MS.changeEmail),
    })
    await noteAudit(trx, { at: now, personId: who.personId, action: 'account.email-asked' })
    await queueMail(
      trx,
      { personId: null, to: input.email, purpose: 'account', ...(isFree ? confirmIt(secret) : taken()) },
      now,
    )
    return { done: true as const }
  })
}

const confirmIt = (secret: string) => ({
  subject: 'Confirm your new address',
  paragraphs: [
    'Your Middlewatch account shall go by this address. Open the link to confirm it; it works once, within a day.',
    'If you know nothing of it, leave it: nothing happens.',
  ],
  action: { label: 'Confirm the address', url: `${env().appUrl}/confirm/${secret}` },
})

const taken = () => ({
  subject: 'You have an account already',
  paragraphs: [
    'Somebody wanted to use this address for another Middlewatch account. It has an account already; nothing was changed.',
  ],
})
