import { createHash, randomBytes } from 'node:crypto'
import { Secret, TOTP } from 'otpauth'
import { lockFactor, noteFactorStep, spendRecoveryCode } from '@/db/queries/account'
import type { Trx } from '@/db/roles'
import { unseal } from './sealed'

const PERIOD_SECONDS = 30
/** A code of the step before or after is taken too: devices' clocks differ. */
const WINDOW_STEPS = 1
const RECOVERY_CODES = 10

/** One-time passwords by time (RFC 6238): SHA-1, six digits, half a minute, as every device knows them. */
export const totpOf = (secret: string, email: string): TOTP =>
  new TOTP({
    issuer: 'Middlewatch',
    label: email,
    algorithm: 'SHA1',
    digits: 6,
    period: PERIOD_SECONDS,
    secret: Secret.fromBase32(secret),
  })

export const newTotpSecret = (): string => new Secret({ size: 20 }).base32

/** The time step whose code this is, or null. */
export function stepOf(secret: string, code: string, now: Date): number | null {
  const token = code.replace(/\s/g, '')
  if (!/^\d{6}$/.test(token)) return null
  const delta = totpOf(secret, '').validate({ token, window: WINDOW_STEPS, timestamp: now.getTime() })
  return delta === null ? null : Math.floor(now.getTime() / 1000 / PERIOD_SECONDS) + delta
}

/** Ten codes of 80 bits for the day the device is lost; each works once. Only the hashes are to be kept. */
export function newRecoveryCodes(): { codes: string[]; hashes: Buffer[] } {
  const codes = Array.from({ length: RECOVERY_CODES }, () =>
    (randomBytes(10).toString('hex').match(/.{5}/g) ?? []).join('-'),
  )
  return { codes, hashes: codes.map(hashRecoveryCode) }
}

const hashRecoveryCode = (code: string): Buffer =>
  createHash('sha256')
    .update(code.toLowerCase().replace(/[^0-9a-f]/g, ''))
    .digest()

/**
 * Takes a code from the device or a recovery code, once.
 * @param trx under the service's role; the person's row is locked until it ends.
 */
export async function takeCode(trx: Trx, personId: string, code: string, now: Date): Promise<boolean> {
  const factor = await lockFactor(trx, personId)
  const secret = factor.sealedSecret === null ? null : unseal(factor.sealedSecret)
  const step = secret === null ? null : stepOf(secret, code, now)
  if (step !== null && (factor.lastStep === null || step > Number(factor.lastStep))) {
    await noteFactorStep(trx, personId, step)
    return true
  }
  return spendRecoveryCode(trx, personId, hashRecoveryCode(code), now)
}
