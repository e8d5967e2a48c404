import pino from 'pino'
import { env } from '@/lib/env'

/** The process's log, one JSON line an entry. Secrets and readings have no place in it. */
export const log = pino({
  level: env().logLevel,
  base: undefined,
  redact: ['password', 'key', '*.password', '*.key'],
})
