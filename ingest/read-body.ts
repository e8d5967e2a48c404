import { constants, gunzip } from 'node:zlib'
import { Problem } from '@/lib/problem'

export const MAX_SENT_BYTES = 8 * 1024 * 1024
export const MAX_UNPACKED_BYTES = 64 * 1024 * 1024

/** The two formats a logger may send. */
export type Format = 'senml' | 'csv'

const FORMATS = new Map<string, Format>([
  ['application/senml+json', 'senml'],
  ['text/csv', 'csv'],
])

/** @throws Problem `wrong-media-type` for anything but SenML in JSON or CSV, in UTF-8. */
export function formatOf(contentType: string | null): Format {
  const [type = '', ...parameters] = (contentType ?? '').toLowerCase().split(';')
  const format = FORMATS.get(type.trim())
  const charset = parameters.find((entry) => entry.trim().startsWith('charset='))?.split('=')[1]
  const utf8 = charset === undefined || /^\s*"?(utf-8|us-ascii)"?\s*$/.test(charset)
  if (format === undefined || !utf8)
    throw new Problem(
      'wrong-media-type',
      'Send application/senml+json or text/csv, in UTF-8, and say so in Content-Type.',
      { headers: { accept: 'application/senml+json, text/csv' } },
    )
  return format
}

/** A body as it was sent. */
export interface SentBody {
  bytes: Buffer
  gzip: boolean
}

/**
 * Reads a request's body, counted while it arrives.
 * @throws Problem `too-large`, `wrong-media-type` (an encoding other than gzip).
 */
export async function readBody(request: Request): Promise<SentBody> {
  const encoding = (request.headers.get('content-encoding') ?? 'identity').trim().toLowerCase()
  if (encoding !== 'identity' && encoding !== 'gzip')
    throw new Problem('wrong-media-type', 'Send the body plain or with Content-Encoding: gzip.', {
      headers: { 'accept-encoding': 'gzip' },
    })
  return { bytes: await collect(request), gzip: encoding === 'gzip' }
}

/**
 * A body's text: stopped while unpacking if it grows too large.
 * @throws Problem `too-large`, `not-parseable` (broken gzip or UTF-8).
 */
export async function textOf({ bytes, gzip }: SentBody): Promise<string> {
  const unpacked = gzip ? await unpack(bytes) : bytes
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(unpacked)
  } catch {
    throw new Problem('not-parseable', 'The body is not UTF-8 text. Send it in UTF-8.')
  }
}

/** A body that may unpack to more than this is read while no other such body is. */
const LARGE_BYTES = 1024 * 1024
/** Sensor data seldom packs better than this. */
const USUAL_PACKING = 10

let lastLarge: Promise<unknown> = Promise.resolve()

/**
 * Runs `work` on a body at once, or, when it is a large one, after the large ones before it: what a process holds in
 * memory is one backlog's text, however many boats come back from sea on the same evening.
 */
export function inTurn<T>({ bytes, gzip }: SentBody, work: () => Promise<T>): Promise<T> {
  if (bytes.byteLength * (gzip ? USUAL_PACKING : 1) <= LARGE_BYTES) return work()
  const turn = lastLarge.then(work)
  lastLarge = turn.catch(() => undefined)
  return turn
}

async function collect(request: Request): Promise<Buffer> {
  const tooLarge = () =>
    new Problem('too-large', 'Send at most 8 MiB at once: split the upload, oldest samples first.', {
      headers: { connection: 'close' },
    })
  if (Number(request.headers.get('content-length') ?? 0) > MAX_SENT_BYTES) throw tooLarge()
  if (request.body === null) return Buffer.alloc(0)
  const chunks: Uint8Array[] = []
  let size = 0
  const reader = request.body.getReader()
  for (;;) {
    const { done, value } = await reader.read()
    if (done) break
    size += value.byteLength
    if (size > MAX_SENT_BYTES) {
      await reader.cancel()
      throw tooLarge()
    }
    chunks.push(value)
  }
  return Buffer.concat(chunks)
}

function unpack(packed: Buffer): Promise<Buffer> {
  return new Promise((resolve, reject) => {
    // Large chunks: with the default of 16 KiB unpacking takes several times as long.
    const options = {
      chunkSize: 1024 * 1024,
      maxOutputLength: MAX_UNPACKED_BYTES,
      finishFlush: constants.Z_FINISH,
    }
    gunzip(packed, options, (error, bytes) => {
      if (error === null) return resolve(bytes)
      if ('code' in error && error.code === 'ERR_BUFFER_TOO_LARGE')
        return reject(
          new Problem(
            'too-large',
            'The body unpacks to more than 64 MiB: split the upload, oldest samples first.',
          ),
        )
      reject(new Problem('not-parseable', 'The body is not whole gzip data. Send it again.'))
    })
  })
}
