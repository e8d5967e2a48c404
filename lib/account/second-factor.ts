import { toString as qrCode } from 'qrcode'
import {
  countRecoveryCodes,
  lockFactor,
  noteFactorStep,
  setFactor,
  setPendingFactor,
  setRecoveryCodes,
} from '@/db/queries/account'
import { noteAudit } from '@/db/queries/audit'
import { endOtherSessions } from '@/db/queries/sessions'
import { asIngest } from '@/db/roles'
import { countCode, forgiveCode } from '@/lib/auth/throttle'
import type { Who } from '@/lib/auth/who'
import { queueMail } from '@/lib/messages/queue-mail'
import { Problem } from '@/lib/problem'
import type { BegunSecondFactor, SecondFactor } from '@/shared/schemas'
import { newRecoveryCodes, newTotpSecret, stepOf, takeCode, totpOf } from './codes'
import { requirePassword } from './require-password'
import { seal, unseal } from './sealed'

export async function getSecondFactor(who: Who): Promise<SecondFactor> {
  return asIngest(async (trx) => {
    const { onSince } = await lockFactor(trx, who.personId)
    return {
      on: onSince !== null,
      since: onSince?.toISOString() ?? null,
      recoveryCodesLeft: await countRecoveryCodes(trx, who.personId),
    }
  })
}

/** Makes a secret for the device to take up. Nothing is asked at sign-in until a code from it was confirmed. */
export async function beginSecondFactor(who: Who, password: string): Promise<BegunSecondFactor> {
  await requirePassword(who, password)
  const secret = newTotpSecret()
  await asIngest(async (trx) => {
    const { onSince } = await lockFactor(trx, who.personId)
    if (onSince !== null) throw new Problem('conflict', 'The second factor is on already: turn it off first.')
    await setPendingFactor(trx, who.personId, seal(secret))
  })
  const uri = totpOf(secret, who.email).toString()
  const svg = await qrCode(uri, { type: 'svg', margin: 2, errorCorrectionLevel: 'M' })
  return { secret, uri, qr: `data:image/svg+xml;base64,${Buffer.from(svg).toString('base64')}` }
}

const wrongCode = (): Problem =>
  new Problem(
    'invalid',
    'That code does not fit. Wait for the next one, and check the clock of the device.',
    {
      extensions: { errors: [{ path: 'code', message: 'does not fit' }] },
    },
  )

/** Turns it on; answers the recovery codes, which exist nowhere else. Other sessions end. */
export async function confirmSecondFactor(
  who: Who,
  code: string,
  now: Date,
): Promise<{ recoveryCodes: string[] }> {
  await countCode(who.personId)
  return asIngest(async (trx) => {
    const { sealedPending } = await lockFactor(trx, who.personId)
    const secret = sealedPending === null ? null : unseal(sealedPending)
    if (sealedPending === null || secret === null)
      throw new Problem('conflict', 'Begin again: there is no secret waiting for its first code.')
    const step = stepOf(secret, code, now)
    if (step === null) throw wrongCode()
    await setFactor(trx, who.personId, sealedPending, now)
    await noteFactorStep(trx, who.personId, step)
    const { codes, hashes } = newRecoveryCodes()
    await setRecoveryCodes(trx, who.personId, hashes, now)
    await endOtherSessions(trx, who.personId, who.sessionId, now)
    await noteAudit(trx, { at: now, personId: who.personId, action: 'account.second-factor-on' })
    return { recoveryCodes: codes }
  })
}

/** New recovery codes; the old ones no longer work. */
export async function renewRecoveryCodes(
  who: Who,
  input: { password: string; code: string },
  now: Date,
): Promise<{ recoveryCodes: string[] }> {
  return withCode(who, input, now, async (trx) => {
    const { codes, hashes } = newRecoveryCodes()
    await setRecoveryCodes(trx, who.personId, hashes, now)
    await noteAudit(trx, { at: now, personId: who.personId, action: 'account.recovery-codes' })
    return { recoveryCodes: codes }
  })
}

/** Turns it off, by password and a code together. */
export async function endSecondFactor(
  who: Who,
  input: { password: string; code: string },
  now: Date,
): Promise<{ done: true }> {
  return withCode(who, input, now, async (trx) => {
    await setFactor(trx, who.personId, null, now)
    await setRecoveryCodes(trx, who.personId, [], now)
    await noteAudit(trx, { at: now, personId: who.personId, action: 'account.second-factor-off' })
    await queueMail(
      trx,
      {
        personId: who.personId,
        to: who.email,
        subject: 'The second factor was turned off',
        paragraphs: [
          'Signing in to your Middlewatch account asks for the password alone from now on. If that was not you, change the password at once and turn it on again.',
        ],
        purpose: 'account',
      },
      now,
    )
    return { done: true as const }
  })
}

async function withCode<Result>(
  who: Who,
  input: { password: string; code: string },
  now: Date,
  work: (trx: Parameters<typeof lockFactor>[0]) => Promise<Result>,
): Promise<Result> {
  await requirePassword(who, input.password)
  await countCode(who.personId)
  const result = await asIngest(async (trx) => {
    const { onSince } = await lockFactor(trx, who.personId)
    if (onSince === null) throw new Problem('conflict', 'The second factor is not on.')
    if (!(await takeCode(trx, who.personId, input.code, now))) throw wrongCode()
    return work(trx)
  })
  await forgiveCode(who.personId)
  return result
}
