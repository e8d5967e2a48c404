import { promisify } from 'node:util'
import { gzip } from 'node:zlib'
import { setTimeout as pause } from 'node:timers/promises'
import { ingestAnswerSchema, type IngestAnswer } from '@/shared/schemas/loggers'
import type { SimSample } from '@/simulator/logger'
import { toSenml } from '@/simulator/senml'

const gzipAsync = promisify(gzip)

/** What a request carries at most: three and a half days of a sample every 15 s, about 3 MB unpacked. */
export const SAMPLES_PER_UPLOAD = 20_000

export type UploadTarget = {
  /** The server's address, such as http://127.0.0.1:3000. */
  url: string
  key: string
  serial: string
  /** Ends waiting and starts nothing more; an upload in hand is finished. */
  signal?: AbortSignal
  /** Cuts an upload in hand too. */
  cutOff?: AbortSignal
  /** Waits between attempts; replaced in tests. */
  wait?: (ms: number, signal?: AbortSignal) => Promise<unknown>
  maxAttempts?: number
  onRetry?: (reason: string, waitMs: number) => void
}

/** The server will never take this upload: resending it is of no use. */
export class UploadRefused extends Error {
  constructor(
    readonly status: number,
    detail: string,
  ) {
    super(`upload refused with ${status}: ${detail}`)
  }
}

const LASTING = new Set([400, 403, 413, 415, 422])
const LONGEST_WAIT_MS = 60_000

/** Seconds or an HTTP date, as milliseconds from now; null when absent or unreadable. */
export function retryAfterMs(header: string | null, nowMs: number): number | null {
  if (header === null || header.trim() === '') return null
  const seconds = Number(header)
  if (Number.isFinite(seconds)) return Math.max(0, seconds * 1000)
  const date = Date.parse(header)
  return Number.isNaN(date) ? null : Math.max(0, date - nowMs)
}

/**
 * Sends one upload and tries again until its id comes back, as a logger does: an answer that is not the
 * server's own (a captive portal says 200 too) counts as none. Waits as long as a 429 or 503 asks for, else
 * from 1 s doubling to 60 s.
 *
 * @param clockOffsetMs how far the logger's clock is ahead, for the `Date` header; null leaves it out.
 * @throws UploadRefused on 400, 403, 413, 415, 422; Error after `maxAttempts` (default: never gives up).
 */
export async function postSamples(
  target: UploadTarget,
  samples: readonly SimSample[],
  clockOffsetMs: number | null = 0,
): Promise<IngestAnswer> {
  const body = await gzipAsync(toSenml(target.serial, samples), { level: 4 })
  const wait = target.wait ?? ((ms: number, signal?: AbortSignal) => pause(ms, undefined, { signal }))
  for (let attempt = 1; ; attempt++) {
    target.signal?.throwIfAborted()
    const tried = await attemptUpload(target, body, clockOffsetMs)
    if ('answer' in tried) return tried.answer
    if (attempt >= (target.maxAttempts ?? Infinity)) throw new Error(`upload failed: ${tried.reason}`)
    const backoff = Math.min(LONGEST_WAIT_MS, 1000 * 2 ** Math.min(attempt - 1, 6))
    const waitMs = tried.retryAfterMs ?? backoff
    target.onRetry?.(tried.reason, waitMs)
    await wait(waitMs, target.signal)
  }
}

type Tried = { answer: IngestAnswer } | { reason: string; retryAfterMs: number | null }

async function attemptUpload(
  target: UploadTarget,
  body: Buffer,
  clockOffsetMs: number | null,
): Promise<Tried> {
  const headers: Record<string, string> = {
    authorization: `Bearer ${target.key}`,
    'content-type': 'application/senml+json',
    'content-encoding': 'gzip',
  }
  if (clockOffsetMs !== null) headers.date = new Date(Date.now() + clockOffsetMs).toUTCString()
  const timeout = AbortSignal.timeout(120_000)
  let response: Response
  let text: string
  try {
    response = await fetch(new URL('/api/ingest', target.url), {
      method: 'POST',
      headers,
      body: new Uint8Array(body),
      signal: target.cutOff ? AbortSignal.any([target.cutOff, timeout]) : timeout,
    })
    text = await response.text()
  } catch (error) {
    target.signal?.throwIfAborted()
    return { reason: error instanceof Error ? error.message : String(error), retryAfterMs: null }
  }
  if (LASTING.has(response.status)) throw new UploadRefused(response.status, text.slice(0, 300))
  if (!response.ok) {
    return {
      reason: `${response.status}`,
      retryAfterMs: retryAfterMs(response.headers.get('retry-after'), Date.now()),
    }
  }
  const parsed = ingestAnswerSchema.safeParse(parseJson(text))
  return parsed.success
    ? { answer: parsed.data }
    : { reason: 'an answer without an upload id', retryAfterMs: null }
}

function parseJson(text: string): unknown {
  try {
    return JSON.parse(text)
  } catch {
    return null
  }
}
