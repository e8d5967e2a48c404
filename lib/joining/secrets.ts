import { createHash, createHmac, randomBytes, randomInt } from 'node:crypto'
import { env } from '@/lib/env'

const MINUTE_MS = 60_000
const HOUR_MS = 60 * MINUTE_MS
const DAY_MS = 24 * HOUR_MS

/** How long each one-time secret is good for. */
export const LIFETIMES_MS = {
  signUp: 2 * DAY_MS,
  invitation: 14 * DAY_MS,
  resetPassword: HOUR_MS,
  changeEmail: DAY_MS,
  confirmContact: DAY_MS,
  phoneCode: 10 * MINUTE_MS,
}

/** A secret of 256 bits for a link, and the hash under which it is known: the secret itself is kept nowhere. */
export function newSecret(): { secret: string; hash: Buffer } {
  const secret = randomBytes(32).toString('base64url')
  return { secret, hash: hashSecret(secret) }
}

/** Random as they are, such secrets need no salt. */
export const hashSecret = (secret: string): Buffer => createHash('sha256').update(secret).digest()

/** Six digits for a text. */
export const newPhoneCode = (): string => String(randomInt(1_000_000)).padStart(6, '0')

/** Six digits are few: hashed with the server's secret and for one number alone, so that a table of all is no use. */
export const hashPhoneCode = (contactId: string, code: string): Buffer =>
  createHmac('sha256', env().secret).update(`phone ${contactId} ${code}`).digest()
