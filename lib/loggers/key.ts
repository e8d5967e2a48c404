import { createHash, randomBytes } from 'node:crypto'

/** 256 random bits, as text that fits in a header. */
export const newKey = (): string => `mwk_${randomBytes(32).toString('base64url')}`

/** What is kept of a key. A fast hash is enough for what nobody can guess. */
export const hashKey = (key: string): Buffer => createHash('sha256').update(key).digest()
