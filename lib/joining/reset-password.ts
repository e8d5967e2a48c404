import { endAllSessions, markEmailConfirmed, readPersonMail } from '@/db/queries/account'
import { noteAudit } from '@/db/queries/audit'
import { findPersonByEmail, setPasswordHash } from '@/db/queries/people'
import { findToken, insertToken, spendTokens } from '@/db/queries/tokens'
import { asIngest } from '@/db/roles'
import { hashPassword } from '@/lib/auth/passwords'
import { countGuess, countMail } from '@/lib/auth/throttle'
import { env } from '@/lib/env'
import { queueMail } from '@/lib/messages/queue-mail'
import { deadLink } from './confirm'
import { hashSecret, LIFETIMES_MS, newSecret } from './secrets'

/**
 * A password was forgotten. The answer, the rows written and the mail queued are of one kind whether the address has
 * an account or not; only its mailbox learns which.
 */
export async function forgotPassword(email: string, from: string, now: Date): Promise<{ done: true }> {
  await countMail(email, from)
  const { secret, hash } = newSecret()
  await asIngest(async (trx) => {
    const personId = await findPersonByEmail(trx, email)
    await insertToken(trx, {
      hash,
      purpose: 'reset-password',
      personId,
      subject: null,
      at: now,
      expiresAt: new Date(now.getTime() + LIFETIMES_MS.resetPassword),
    })
    const text = personId === null ? nobody() : somebody(secret)
    await queueMail(trx, { personId, to: email, ...text, purpose: 'account' }, now)
  })
  return { done: true }
}

const somebody = (secret: string) => ({
  subject: 'Choose a new password',
  paragraphs: [
    'Somebody, we think you, asked for a new password on Middlewatch. The link works once, within an hour.',
    'If it was not you, leave it: the old password stays.',
  ],
  action: { label: 'Choose a new password', url: `${env().appUrl}/reset-password/${secret}` },
})

const nobody = () => ({
  subject: 'No account with this address',
  paragraphs: [
    'Somebody asked for a new password on Middlewatch, but no account goes by this address. Perhaps it is another of yours.',
    'If it was not you, leave it: nothing happens.',
  ],
  action: { label: 'Sign in or sign up', url: `${env().appUrl}/sign-in` },
})

/** Whether the link still leads somewhere. Changes nothing. */
export async function resetLinkWorks(secret: string, now: Date): Promise<boolean> {
  const hash = hashSecret(secret)
  return (await asIngest((trx) => findToken(trx, hash, ['reset-password'], now, false))) !== null
}

/** Sets the new password; every session ends, and no other reset link works any more. @throws Problem `gone` */
export async function resetPassword(
  input: { token: string; password: string },
  from: string,
  now: Date,
): Promise<{ done: true }> {
  const hash = hashSecret(input.token)
  if (!(await resetLinkWorks(input.token, now))) {
    await countGuess('reset', from)
    throw deadLink()
  }
  const passwordHash = await hashPassword(input.password)
  return asIngest(async (trx) => {
    const token = await findToken(trx, hash, ['reset-password'], now, true)
    if (token === null) throw deadLink()
    const { personId } = token
    await setPasswordHash(trx, personId, passwordHash)
    await markEmailConfirmed(trx, personId, now)
    await endAllSessions(trx, personId, now)
    await spendTokens(trx, { personId, purpose: 'reset-password' }, now)
    await noteAudit(trx, { at: now, personId, action: 'account.password-reset' })
    const person = await readPersonMail(trx, personId)
    await queueMail(
      trx,
      {
        personId,
        to: person.email,
        subject: 'Your password was changed',
        paragraphs: [
          'A new password was chosen by the link in an earlier mail, and every device was signed out. If that was not you, ask for a new password at once.',
        ],
        purpose: 'account',
      },
      now,
    )
    return { done: true as const }
  })
}
