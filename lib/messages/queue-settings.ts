import type PgBoss from 'pg-boss'

export const QUEUE_SCHEMA = 'queue'
/** Jobs that carry a message's id and nothing else. */
export const QUEUE = 'message'
/** Where a job goes when its last try failed, or the worker died in it. */
export const DEAD_QUEUE = 'message-dead'

export interface MessageJob {
  messageId: string
}

/**
 * Tries after 2, 4, 8 … seconds, doubled each time with chance on top: eleven tries in about an hour. A job
 * whose worker was killed is free again after 20 s (the service's answer is waited for 10 s at most).
 */
export const QUEUE_OPTIONS = {
  name: QUEUE,
  policy: 'standard',
  retryLimit: 10,
  retryDelay: 2,
  retryBackoff: true,
  expireInSeconds: 20,
  deadLetter: DEAD_QUEUE,
} as const satisfies PgBoss.Queue

export const SERVICE_TIMEOUT_MS = 10_000
