import pino from 'pino'

const LEVELS = ['fatal', 'error', 'warn', 'info', 'debug', 'trace', 'silent']

/**
 * The process's log, one JSON line an entry. Secrets and readings have no place in it. It reads its level by itself,
 * since it is loaded where the rest of the environment need not be right yet, as when pages are built.
 */
export const log = pino({
  level: LEVELS.find((level) => level === process.env.LOG_LEVEL) ?? 'info',
  base: undefined,
  redact: ['password', 'key', '*.password', '*.key'],
})
