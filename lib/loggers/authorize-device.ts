import { randomBytes, randomInt } from 'node:crypto'
import { insertClaim } from '@/db/queries/claims'
import { asIngest } from '@/db/roles'
import { env } from '@/lib/env'
import { serialSchema } from '@/shared/schemas'
import { hashKey } from './key'
import { OAuthError } from './oauth'

const CLAIM_SECONDS = 900
export const POLL_SECONDS = 5
/** Consonants alone: no words, nothing that looks like another (RFC 8628 6.1). */
const LETTERS = 'BCDFGHJKLMNPQRSTVWXZ'

const newUserCode = (): string => Array.from({ length: 8 }, () => LETTERS[randomInt(LETTERS.length)]).join('')

/** `WDJB-MJHT`, as it is shown and read out. */
export const shownCode = (userCode: string): string => `${userCode.slice(0, 4)}-${userCode.slice(4)}`

/** Spaces, dashes and small letters are how people type. */
export const typedCode = (text: string): string => text.toUpperCase().replace(/[^A-Z]/g, '')

/**
 * RFC 8628 3.1: a logger asks to be claimed.
 * @throws OAuthError `invalid_client` for a name that is no serial
 */
export async function authorizeDevice(clientId: string | undefined, now: Date) {
  if (clientId === undefined || clientId === '')
    throw new OAuthError('invalid_request', 'client_id is missing')
  const serial = serialSchema.safeParse(clientId)
  if (!serial.success) throw new OAuthError('invalid_client', 'client_id is not a serial')
  const deviceCode = randomBytes(32).toString('base64url')
  const claim = {
    deviceCodeHash: hashKey(deviceCode),
    serial: serial.data,
    createdAt: now,
    expiresAt: new Date(now.getTime() + CLAIM_SECONDS * 1000),
    intervalSeconds: POLL_SECONDS,
  }
  for (;;) {
    const userCode = newUserCode()
    if (!(await asIngest((trx) => insertClaim(trx, { ...claim, userCode })))) continue
    const verificationUri = `${env().appUrl}/claim`
    return {
      device_code: deviceCode,
      user_code: shownCode(userCode),
      verification_uri: verificationUri,
      verification_uri_complete: `${verificationUri}?code=${shownCode(userCode)}`,
      expires_in: CLAIM_SECONDS,
      interval: POLL_SECONDS,
    }
  }
}
