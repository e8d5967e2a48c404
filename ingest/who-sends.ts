import { createHash } from 'node:crypto'
import { RateLimiterMemory, RateLimiterRes } from 'rate-limiter-flexible'
import { loggerByKeyHash, type IngestLogger } from '@/db/queries/ingest-loggers'
import { asIngest } from '@/db/roles'
import { Problem } from '@/lib/problem'

/** A logger's usual is one upload a minute; a backlog comes in tens. What comes faster is a fault in a loop. */
const UPLOADS_PER_MINUTE = 1_200

const limiter = new RateLimiterMemory({ points: UPLOADS_PER_MINUTE, duration: 60 })

/** How a logger's key is stored: its SHA-256. */
export const hashKey = (key: string): Buffer => createHash('sha256').update(key, 'utf8').digest()

/**
 * The logger that a request comes from.
 * @throws Problem `unknown-key`, `retired`, or `too-many-requests` with Retry-After.
 */
export async function whoSends(request: Request): Promise<IngestLogger> {
  const key = /^Bearer +([\x21-\x7e]+) *$/i.exec(request.headers.get('authorization') ?? '')?.[1]
  const logger = key === undefined ? null : await asIngest((trx) => loggerByKeyHash(trx, hashKey(key)))
  if (logger === null)
    throw new Problem('unknown-key', 'Send the key of a registered logger as Authorization: Bearer <key>.', {
      headers: { 'www-authenticate': 'Bearer realm="ingest"' },
    })
  refuseRetired(logger)
  await countUpload(logger.id)
  return logger
}

/** @throws Problem `retired` */
export function refuseRetired(logger: IngestLogger): void {
  if (logger.retiredAt !== null)
    throw new Problem('retired', `Logger ${logger.serial} is retired. Register it again before it may send.`)
}

async function countUpload(loggerId: string): Promise<void> {
  try {
    await limiter.consume(loggerId)
  } catch (refusal) {
    if (!(refusal instanceof RateLimiterRes)) throw refusal
    const seconds = Math.max(1, Math.ceil(refusal.msBeforeNext / 1000))
    throw new Problem(
      'too-many-requests',
      `Wait ${seconds} seconds and send on; put more samples in one upload.`,
      {
        headers: { 'retry-after': String(seconds) },
      },
    )
  }
}
