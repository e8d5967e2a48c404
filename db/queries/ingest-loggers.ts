import type { Trx } from '@/db/roles'

/** A logger as ingest knows it. */
export interface IngestLogger {
  id: string
  serial: string
  intervalSeconds: number
  retiredAt: Date | null
  fineIntervalSeconds: number | null
  fineUntil: Date | null
}

/** A time span in which a logger belongs to a system, half-open, epoch milliseconds; toMs may be Infinity. */
export interface LoggerFitting {
  systemId: string
  fromMs: number
  toMs: number
  /** Samples before this are final; -Infinity when nothing is sealed. */
  sealedUntilMs: number
}

interface LoggerRow {
  id: number
  serial: string
  interval_seconds: number
  retired_at: Date | null
  fine_interval_seconds: number | null
  fine_until: Date | null
}

const COLUMNS = 'id, serial, interval_seconds, retired_at, fine_interval_seconds, fine_until'

const toLogger = (row: LoggerRow): IngestLogger => ({
  id: String(row.id),
  serial: row.serial,
  intervalSeconds: row.interval_seconds,
  retiredAt: row.retired_at,
  fineIntervalSeconds: row.fine_interval_seconds,
  fineUntil: row.fine_until,
})

/** The logger whose key has this SHA-256, or null. */
export async function loggerByKeyHash(trx: Trx, keyHash: Buffer): Promise<IngestLogger | null> {
  const { rows } = await trx.raw<{ rows: LoggerRow[] }>(`select ${COLUMNS} from logger where key_hash = ?`, [
    keyHash,
  ])
  return rows[0] === undefined ? null : toLogger(rows[0])
}

/**
 * Locks a logger for the rest of the transaction, so that its samples have one writer. Taken before any
 * system_state lock. @returns null when it is no longer there.
 */
export async function lockLogger(trx: Trx, loggerId: string): Promise<IngestLogger | null> {
  const { rows } = await trx.raw<{ rows: LoggerRow[] }>(
    `select ${COLUMNS} from logger where id = ? for no key update`,
    [loggerId],
  )
  return rows[0] === undefined ? null : toLogger(rows[0])
}

/** Those of the words that are the serial of a logger other than this one. */
export async function otherSerials(trx: Trx, loggerId: string, words: string[]): Promise<Set<string>> {
  if (words.length === 0) return new Set()
  const { rows } = await trx.raw<{ rows: { serial: string }[] }>(
    'select serial from logger where serial = any (?::text[]) and id <> ?',
    [words, loggerId],
  )
  return new Set(rows.map((row) => row.serial))
}

/** Where and when the logger was fitted, oldest first. */
export async function fittingsOfLogger(trx: Trx, loggerId: string): Promise<LoggerFitting[]> {
  const { rows } = await trx.raw<{
    rows: { system_id: string; from_ms: number; to_ms: number | null; sealed_ms: number | null }[]
  }>(
    `select f.system_id, (extract(epoch from lower(f.span)) * 1000)::float8 as from_ms,
       (extract(epoch from upper(f.span)) * 1000)::float8 as to_ms,
       (extract(epoch from s.sealed_until) * 1000)::float8 as sealed_ms
     from logger_fitting f left join system_state s on s.system_id = f.system_id
     where f.logger_id = ? order by lower(f.span)`,
    [loggerId],
  )
  return rows.map((row) => ({
    systemId: row.system_id,
    fromMs: row.from_ms,
    toMs: row.to_ms ?? Infinity,
    sealedUntilMs: row.sealed_ms ?? -Infinity,
  }))
}

/** The logger is heard of up to `heardAt`; its clock stood off by so much (null: it did not say). */
export async function noteHeard(
  trx: Trx,
  loggerId: string,
  heardAt: Date,
  clockOffsetSeconds: number | null,
): Promise<void> {
  await trx.raw(
    `update logger set last_heard_at = greatest(last_heard_at, ?),
       clock_offset_seconds = coalesce(?::float8, clock_offset_seconds) where id = ?`,
    [heardAt, clockOffsetSeconds, loggerId],
  )
}
