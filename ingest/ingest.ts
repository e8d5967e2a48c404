import {
  fittingsOfLogger,
  lockLogger,
  noteHeard,
  otherSerials,
  type IngestLogger,
  type LoggerFitting,
} from '@/db/queries/ingest-loggers'
import { limitLockWait, noteSystemHeard } from '@/db/queries/system-state'
import { answerByKey, insertUpload, lastShiftSeconds, nextUploadId } from '@/db/queries/uploads'
import { asIngest, type Trx } from '@/db/roles'
import { check, endsOf, possibleSerials, type Batch, type Checked } from '@/ingest/check'
import { clockOffsetSeconds, shiftSeconds } from '@/ingest/clock'
import { parseCsv } from '@/ingest/parse-csv'
import { parseSenml } from '@/ingest/parse-senml'
import { formatOf, inTurn, readBody, textOf, type Format } from '@/ingest/read-body'
import type { RecordColumns } from '@/ingest/records'
import { store } from '@/ingest/store'
import { inLine } from '@/ingest/in-line'
import { lockReached, takeIn } from '@/ingest/take-in'
import { refuseRetired, whoSends } from '@/ingest/who-sends'
import { Problem } from '@/lib/problem'
import { ingestAnswerSchema, type IngestAnswer } from '@/shared/schemas/loggers'

const MAX_KEY_LENGTH = 200

/**
 * Takes one upload in, from its request to the answer: read, parse, check, store, fold, judge, in one transaction.
 * The answer exists only once all of it is committed.
 * @param receivedAt the moment of receipt: relative times and the clock's offset count from it.
 * @throws Problem for every refusal; then nothing was changed.
 */
export async function ingest(request: Request, receivedAt: Date): Promise<IngestAnswer> {
  const sender = await whoSends(request)
  const format = formatOf(request.headers.get('content-type'))
  const key = idempotencyKey(request.headers)
  const body = await readBody(request)
  const records = await inTurn(body, async () => {
    const text = await textOf(body)
    return format === 'senml' ? parseSenml(text, receivedAt.getTime()) : parseCsv(text)
  })
  const offsetSeconds = clockOffsetSeconds(request.headers.get('date'), receivedAt.getTime())
  const upload = { sender, format, key, records, offsetSeconds, receivedAt }
  return inLine(sender.id, () => asIngest((trx) => takeUpload(trx, upload)))
}

function idempotencyKey(headers: Headers): string | null {
  const key = headers.get('idempotency-key')
  if (key === null || key === '') return null
  if (key.length > MAX_KEY_LENGTH)
    throw new Problem('bad-request', `An Idempotency-Key has at most ${MAX_KEY_LENGTH} characters.`)
  return key
}

interface Upload {
  sender: IngestLogger
  format: Format
  key: string | null
  records: RecordColumns
  offsetSeconds: number | null
  receivedAt: Date
}

async function takeUpload(trx: Trx, upload: Upload): Promise<IngestAnswer> {
  const { format, key, records, offsetSeconds, receivedAt } = upload
  await limitLockWait(trx)
  const logger = await lockLogger(trx, upload.sender.id)
  if (logger === null) throw new Problem('unknown-key', 'The logger is no longer registered.')
  refuseRetired(logger)
  if (key !== null) {
    const before = await answerByKey(trx, logger.id, key, receivedAt)
    if (before !== null) return ingestAnswerSchema.parse(before.answer)
  }

  const fittings = await fittingsOfLogger(trx, logger.id)
  const shift = shiftSeconds(
    offsetSeconds,
    offsetSeconds === null ? null : await lastShiftSeconds(trx, logger.id),
  )
  const checked = check(records, {
    receiptMs: receivedAt.getTime(),
    offsetSeconds: offsetSeconds ?? 0,
    shiftSeconds: shift,
    sealed: fittings.map(({ fromMs, toMs, sealedUntilMs }) => ({
      fromMs,
      toMs: Math.min(toMs, sealedUntilMs),
    })),
    otherLoggers: await otherLoggers(trx, logger.id, records),
  })
  const { batch } = checked
  if (batch.count === 0) throw nothingUsable(checked)

  const reached = await lockReached(trx, fittings, batch)
  const id = await nextUploadId(trx)
  const stored = await store(trx, logger.id, id, batch)
  await noteHeard(trx, logger.id, heardOf(batch, [ALWAYS], receivedAt) ?? receivedAt, offsetSeconds)
  const answer: IngestAnswer = {
    upload: id,
    samples: {
      received: batch.count + checked.rejectedSamples,
      stored: stored.stored,
      duplicate: stored.duplicate,
      conflicting: stored.conflicting,
      rejected: checked.rejectedSamples,
    },
    rejected: checked.rejected,
    rejectedRecords: checked.rejectedRecords,
    clock: { offsetSeconds },
    serverTime: receivedAt.toISOString(),
    next: rhythm(logger, receivedAt),
  }
  await insertUpload(trx, {
    id,
    loggerId: logger.id,
    receivedAt,
    idempotencyKey: key,
    format,
    ...endsOf(batch),
    ...answer.samples,
    clockOffsetSeconds: offsetSeconds,
    shiftSeconds: shift,
    answer,
    importedBy: null,
  })
  for (const { state, spans } of reached) {
    const heardAt = heardOf(batch, spans, receivedAt)
    if (heardAt !== null) await noteSystemHeard(trx, state.systemId, heardAt)
    await takeIn(trx, state, spans, stored.changed, receivedAt)
  }
  return answer
}

const ALWAYS = { fromMs: -Infinity, toMs: Infinity }

/**
 * A system, and its logger, is heard of up to its newest reading, not up to the moment when it arrived: a backlog that ends two days
 * ago says nothing of these two days.
 */
function heardOf(
  batch: Batch,
  spans: readonly Pick<LoggerFitting, 'fromMs' | 'toMs'>[],
  receivedAt: Date,
): Date | null {
  let newestMs = -Infinity
  for (let index = 0; index < batch.count; index += 1) {
    const at = batch.at[index] ?? -Infinity
    if (at > newestMs && spans.some(({ fromMs, toMs }) => at >= fromMs && at < toMs)) newestMs = at
  }
  // A batch may reach over a fitting without a reading within it.
  return newestMs === -Infinity ? null : new Date(Math.min(newestMs, receivedAt.getTime()))
}

async function otherLoggers(trx: Trx, loggerId: string, records: RecordColumns): Promise<Set<number>> {
  const words = possibleSerials(records.names)
  const others = await otherSerials(trx, loggerId, [...words.keys()])
  return new Set([...others].flatMap((serial) => words.get(serial) ?? []))
}

function nothingUsable({ rejected, rejectedRecords }: Checked): Problem {
  const [first] = rejected
  const why =
    first === undefined
      ? 'There is no measurement in it.'
      : `All ${rejectedRecords} records were refused; record ${first.index} because: ${first.reason}.`
  return new Problem('nothing-usable', `${why} Nothing was stored; do not send it again as it is.`, {
    extensions: { rejected, rejectedRecords },
  })
}

/** The rhythm asked for: a finer one while somebody watches. */
function rhythm(logger: IngestLogger, now: Date): IngestAnswer['next'] {
  const { fineIntervalSeconds, fineUntil, intervalSeconds } = logger
  return fineIntervalSeconds !== null && fineUntil !== null && fineUntil > now
    ? { intervalSeconds: fineIntervalSeconds, until: fineUntil.toISOString() }
    : { intervalSeconds, until: null }
}
