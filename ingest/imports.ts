import { fittingsOfLogger, lockLogger } from '@/db/queries/ingest-loggers'
import { deleteSamplesOf, rollUpHours } from '@/db/queries/samples'
import { limitLockWait, lockStates } from '@/db/queries/system-state'
import { insertUpload, lockImport, markUndone, nextUploadId } from '@/db/queries/uploads'
import type { Trx } from '@/db/roles'
import { check, endsOf, type Checked } from '@/ingest/check'
import type { RecordColumns } from '@/ingest/records'
import { store } from '@/ingest/store'
import { lockReached, settle, takeIn } from '@/ingest/take-in'
import { Problem } from '@/lib/problem'

const HOUR_MS = 3_600_000

/** What a person brings in: entries of one logger, read from its card by `parseCsv` or mapped by hand. */
export interface Import {
  loggerId: string
  personId: string
  records: RecordColumns
  now: Date
}

export interface ImportAnswer {
  upload: string
  samples: { received: number; stored: number; duplicate: number; conflicting: number; rejected: number }
  rejected: Checked['rejected']
  rejectedRecords: number
}

/**
 * What an import would be judged as, without storing anything: for the preview. Changes `records`, so parse anew
 * for the import itself.
 */
export async function previewImport(
  trx: Trx,
  { loggerId, records, now }: Omit<Import, 'personId'>,
): Promise<Checked> {
  const fittings = await fittingsOfLogger(trx, loggerId)
  return check(records, {
    receiptMs: now.getTime(),
    offsetSeconds: 0,
    shiftSeconds: 0,
    sealed: fittings.map(({ fromMs, toMs, sealedUntilMs }) => ({
      fromMs,
      toMs: Math.min(toMs, sealedUntilMs),
    })),
    otherLoggers: new Set(),
  })
}

/**
 * Brings a person's samples in. They only add times that are not stored yet; the logger's own samples replace them
 * whenever they come.
 * @param trx under the service's role; whether the person may is the caller's question.
 * @throws Problem `not-found` for an unknown logger, `nothing-usable`.
 */
export async function importSamples(trx: Trx, given: Import): Promise<ImportAnswer> {
  const { loggerId, personId, now } = given
  await limitLockWait(trx)
  const logger = await lockLogger(trx, loggerId)
  if (logger === null) throw new Problem('not-found', 'There is no such logger.')
  const { batch, rejected, rejectedRecords, rejectedSamples } = await previewImport(trx, given)
  if (batch.count === 0)
    throw new Problem(
      'nothing-usable',
      'No row of the table could be used: look at the reasons beside them.',
      {
        extensions: { rejected, rejectedRecords },
      },
    )
  const reached = await lockReached(trx, await fittingsOfLogger(trx, loggerId), batch)
  const id = await nextUploadId(trx)
  const stored = await store(trx, loggerId, id, batch, { onlyNewTimes: true })
  const samples = {
    received: batch.count + rejectedSamples,
    stored: stored.stored,
    duplicate: stored.duplicate,
    conflicting: stored.conflicting,
    rejected: rejectedSamples,
  }
  await insertUpload(trx, {
    id,
    loggerId,
    receivedAt: now,
    idempotencyKey: null,
    format: 'import',
    ...endsOf(batch),
    ...samples,
    clockOffsetSeconds: null,
    shiftSeconds: 0,
    answer: null,
    importedBy: personId,
  })
  for (const { state, spans } of reached) await takeIn(trx, state, spans, stored.changed, now)
  return { upload: id, samples, rejected, rejectedRecords }
}

/**
 * Takes an import back: what it brought and no logger has replaced since goes, and the rows follow.
 * @returns how many samples went.
 * @throws Problem `not-found`, `conflict` when it was taken back before.
 */
export async function undoImport(trx: Trx, uploadId: string, now: Date): Promise<number> {
  await limitLockWait(trx)
  const done = await lockImport(trx, uploadId)
  if (done === null) throw new Problem('not-found', 'There is no such import.')
  if (done.undoneAt !== null) throw new Problem('conflict', 'This import was taken back already.')
  await lockLogger(trx, done.loggerId)
  const fittings = await fittingsOfLogger(trx, done.loggerId)
  const reached = fittings.filter(({ fromMs, toMs }) => fromMs <= done.lastMs && toMs > done.firstMs)
  const states = await lockStates(
    trx,
    reached.map(({ systemId }) => systemId),
  )
  const gone = await deleteSamplesOf(trx, done.loggerId, uploadId, {
    fromMs: done.firstMs,
    toMs: done.lastMs,
  })
  await markUndone(trx, uploadId, now)
  if (gone === null) return 0
  await rollUpHours(trx, done.loggerId, hoursBetween(gone.fromMs, gone.toMs))
  for (const state of states) await settle(trx, state, { fromMs: gone.fromMs, toMs: gone.toMs }, now)
  return gone.count
}

function hoursBetween(fromMs: number, toMs: number): number[] {
  const first = Math.floor(fromMs / HOUR_MS)
  return Array.from({ length: Math.floor(toMs / HOUR_MS) - first + 1 }, (_, i) => (first + i) * HOUR_MS)
}
