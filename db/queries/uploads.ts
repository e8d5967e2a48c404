import type { Trx } from '@/db/roles'

/** How long an Idempotency-Key brings the same answer again. */
export const IDEMPOTENCY_DAYS = 7

export interface UploadRow {
  id: string
  loggerId: string
  receivedAt: Date
  idempotencyKey: string | null
  format: 'senml' | 'csv' | 'import'
  /** First and last time stored or met, epoch milliseconds. */
  firstMs: number | null
  lastMs: number | null
  received: number
  stored: number
  duplicate: number
  conflicting: number
  rejected: number
  clockOffsetSeconds: number | null
  /** What the sample times were shifted by; 0 = as sent. */
  shiftSeconds: number
  answer: unknown
  importedBy: string | null
}

/** The answer once given under this key, or null. Forgets the key when its seven days are over. */
export async function answerByKey(
  trx: Trx,
  loggerId: string,
  key: string,
  now: Date,
): Promise<{ answer: unknown } | null> {
  const kept = new Date(now.getTime() - IDEMPOTENCY_DAYS * 86_400_000)
  await trx.raw(
    `update upload set idempotency_key = null, answer = null
     where logger_id = ? and idempotency_key = ? and received_at < ?`,
    [loggerId, key, kept],
  )
  const { rows } = await trx.raw<{ rows: { answer: unknown }[] }>(
    'select answer from upload where logger_id = ? and idempotency_key = ?',
    [loggerId, key],
  )
  return rows[0] ?? null
}

/** Forgets keys and answers older than seven days; answers how many. For the daily tick. */
export async function forgetOldAnswers(trx: Trx, now: Date): Promise<number> {
  const kept = new Date(now.getTime() - IDEMPOTENCY_DAYS * 86_400_000)
  const { rowCount } = await trx.raw<{ rowCount: number }>(
    `update upload set idempotency_key = null, answer = null
     where received_at < ? and (idempotency_key is not null or answer is not null)`,
    [kept],
  )
  return rowCount
}

/** An id for the upload under way: samples carry it before its row, with the counts, can be written. */
export async function nextUploadId(trx: Trx): Promise<string> {
  const { rows } = await trx.raw<{ rows: { id: string }[] }>(
    `select nextval(pg_get_serial_sequence('upload', 'id')) as id`,
  )
  return String(rows[0]?.id)
}

export async function insertUpload(trx: Trx, upload: UploadRow): Promise<void> {
  await trx.raw(
    `insert into upload (id, logger_id, received_at, idempotency_key, format, first_at, last_at, received, stored,
       duplicate, conflicting, rejected, clock_offset_seconds, shift_seconds, shifted, answer, imported_by)
     overriding system value values (?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?)`,
    [
      upload.id,
      upload.loggerId,
      upload.receivedAt,
      upload.idempotencyKey,
      upload.format,
      upload.firstMs === null ? null : new Date(upload.firstMs),
      upload.lastMs === null ? null : new Date(upload.lastMs),
      upload.received,
      upload.stored,
      upload.duplicate,
      upload.conflicting,
      upload.rejected,
      upload.clockOffsetSeconds,
      upload.shiftSeconds,
      upload.shiftSeconds !== 0,
      // Only what was asked under a key can be asked again.
      upload.idempotencyKey === null ? null : JSON.stringify(upload.answer),
      upload.importedBy,
    ],
  )
}

/** What the logger's last shifted upload was shifted by, seconds; null when none was. */
export async function lastShiftSeconds(trx: Trx, loggerId: string): Promise<number | null> {
  const { rows } = await trx.raw<{ rows: { shift_seconds: number }[] }>(
    `select shift_seconds from upload where logger_id = ? and shift_seconds <> 0
     order by received_at desc, id desc limit 1`,
    [loggerId],
  )
  return rows[0]?.shift_seconds ?? null
}

export interface ImportRow {
  id: string
  loggerId: string
  firstMs: number
  lastMs: number
  undoneAt: Date | null
}

/** A person's import, locked; null when there is none of this id. */
export async function lockImport(trx: Trx, uploadId: string): Promise<ImportRow | null> {
  const { rows } = await trx.raw<{
    rows: { id: number; logger_id: number; first_at: Date; last_at: Date; undone_at: Date | null }[]
  }>(
    `select id, logger_id, first_at, last_at, undone_at from upload
     where id = ? and format = 'import' for no key update`,
    [uploadId],
  )
  const row = rows[0]
  return row === undefined
    ? null
    : {
        id: String(row.id),
        loggerId: String(row.logger_id),
        firstMs: row.first_at.getTime(),
        lastMs: row.last_at.getTime(),
        undoneAt: row.undone_at,
      }
}

export async function markUndone(trx: Trx, uploadId: string, at: Date): Promise<void> {
  await trx.raw('update upload set undone_at = ? where id = ?', [at, uploadId])
}
