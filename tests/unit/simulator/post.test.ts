import { createServer, type IncomingMessage, type Server, type ServerResponse } from 'node:http'
import { gunzipSync } from 'node:zlib'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import {
  CLEAN,
  defaultBoat,
  flowForBoatHold,
  simulateBoat,
  type BoatOverrides,
  type SimSample,
} from '@/simulator/boat'
import { driftingClock } from '@/simulator/logger'
import { postSamples, retryAfterMs, UploadRefused } from '@/simulator/post'
import { toSenml } from '@/simulator/senml'
import { loggerOf, type Progress } from '@/simulator/uploader'

const FROM = Date.UTC(2026, 4, 3)
const HOUR = 3_600_000
const sample = (at: number, more: Partial<SimSample> = {}): SimSample => ({
  at,
  vacuumPa: 30_000.1,
  pumpOn: false,
  airC: null,
  barometerPa: null,
  supplyV: null,
  ...more,
})
const accepted = (samples = 1) => ({
  upload: '7',
  samples: { received: samples, stored: samples, duplicate: 0, conflicting: 0, rejected: 0 },
  rejected: [],
  rejectedRecords: 0,
  clock: { offsetSeconds: null },
  serverTime: new Date(FROM).toISOString(),
  next: { intervalSeconds: 60, until: null as string | null },
})

describe('a SenML pack', () => {
  it('has base name and time once, units, a boolean pump, and milliseconds in relative times (RFC 8428, 4 and 5)', () => {
    const pack: unknown = JSON.parse(
      toSenml('MW-1', [
        sample(1_790_000_000_250),
        sample(1_790_000_015_000, { pumpOn: true, vacuumPa: null, airC: 18.5 }),
      ]),
    )
    expect(pack).toEqual([
      { bn: 'MW-1:', bt: 1_790_000_000, n: 'pump', t: 0.25, vb: false },
      { n: 'vacuum', t: 0.25, u: 'Pa', v: 30_000.1 },
      { n: 'pump', t: 15, vb: true },
      { n: 'air', t: 15, u: 'Cel', v: 18.5 },
    ])
  })
  it('needs a sample', () => {
    expect(() => toSenml('MW-1', [])).toThrow(RangeError)
  })
})

describe('posting', () => {
  type Seen = {
    headers: IncomingMessage['headers']
    pack: { n: string; t?: number; bt?: number; v?: number }[]
  }
  let server: Server
  let url = ''
  let seen: Seen[] = []
  let answers: ((response: ServerResponse, seen: Seen) => void)[] = []
  const json =
    (status: number, value: unknown, headers: Record<string, string> = {}) =>
    (response: ServerResponse) =>
      response
        .writeHead(status, { 'content-type': 'application/json', ...headers })
        .end(JSON.stringify(value))

  beforeEach(async () => {
    seen = []
    answers = []
    server = createServer((request, response) => {
      const chunks: Buffer[] = []
      request.on('data', (chunk: Buffer) => chunks.push(chunk))
      request.on('end', () => {
        const pack = JSON.parse(gunzipSync(Buffer.concat(chunks)).toString()) as Seen['pack']
        const request_ = { headers: request.headers, pack }
        seen.push(request_)
        const answer = answers.shift() ?? json(200, accepted(pack.length))
        answer(response, request_)
      })
    })
    await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve))
    const address = server.address()
    url = `http://127.0.0.1:${address !== null && typeof address === 'object' ? address.port : ''}`
  })
  afterEach(() => {
    server.closeAllConnections()
    server.close()
  })

  const waits: number[] = []
  const target = () => {
    waits.length = 0
    return {
      url,
      key: 'secret-key',
      serial: 'MW-1',
      wait: (ms: number) => {
        waits.push(ms)
        return Promise.resolve()
      },
    }
  }

  it("sends gzip with the key and its own clock's date", async () => {
    const answer = await postSamples(target(), [sample(FROM)], 3_600_000)
    expect(answer.upload).toBe('7')
    const [request] = seen
    expect(request?.headers).toMatchObject({
      authorization: 'Bearer secret-key',
      'content-type': 'application/senml+json',
      'content-encoding': 'gzip',
    })
    const ahead = Date.parse(request?.headers.date ?? '') - Date.now()
    expect(Math.abs(ahead - 3_600_000)).toBeLessThan(5000)
  })

  it('waits as long as it is told, keeps its samples through a portal and a cut line, and sends them again', async () => {
    answers = [
      json(503, {}, { 'retry-after': '7' }),
      json(429, {}, { 'retry-after': '2' }),
      (response) => response.writeHead(200, { 'content-type': 'text/html' }).end('<h1>Accept our terms</h1>'),
      json(200, { upload: null }),
      (response) => response.destroy(),
      json(401, {}),
    ]
    await postSamples(target(), [sample(FROM)])
    expect(seen).toHaveLength(7)
    expect(seen.every((each) => JSON.stringify(each.pack) === JSON.stringify(seen[0]?.pack))).toBe(true)
    expect(waits).toEqual([7000, 2000, 4000, 8000, 16_000, 32_000])
  })

  it('does not resend what can never be taken', async () => {
    for (const status of [400, 403, 413, 415, 422]) {
      answers = [json(status, { title: 'no' })]
      await expect(postSamples(target(), [sample(FROM)])).rejects.toMatchObject({ status })
    }
    expect(seen).toHaveLength(5)
    expect(new UploadRefused(422, 'x')).toBeInstanceOf(Error)
  })

  it('gives up when told how often to try, and at once when aborted', async () => {
    answers = [json(503, {}), json(503, {})]
    await expect(postSamples({ ...target(), maxAttempts: 2 }, [sample(FROM)])).rejects.toThrow('503')
    await expect(postSamples({ ...target(), signal: AbortSignal.abort() }, [sample(FROM)])).rejects.toThrow()
    expect(seen).toHaveLength(2)
  })

  it('reads Retry-After in seconds and as a date (RFC 9110, 10.2.3)', () => {
    expect(retryAfterMs('120', FROM)).toBe(120_000)
    expect(retryAfterMs(new Date(FROM + 5000).toUTCString(), FROM)).toBe(5000)
    expect(retryAfterMs('soon', FROM)).toBeNull()
    expect(retryAfterMs(null, FROM)).toBeNull()
  })

  describe('a whole logger', () => {
    const boat = (logger: BoatOverrides['logger'] = {}) => {
      const base = defaultBoat(CLEAN)
      const leak = {
        part: 'tank',
        kind: 'laminar' as const,
        flowPaM3PerS: flowForBoatHold(base, 'laminar', 3600),
      }
      return defaultBoat({
        ...CLEAN,
        leaks: [leak],
        logger: { ...CLEAN.logger, channels: ['pump', 'vacuum'], ...logger },
      })
    }
    const times = (each: Seen): number[] =>
      each.pack
        .filter((record) => record.n === 'pump')
        .map((record) => (each.pack[0]?.bt ?? 0) * 1000 + Math.round((record.t ?? 0) * 1000))

    it('posts each sample once over any number of visits and restarts, in order', async () => {
      const spec = boat()
      let progress: Progress = { postedTo: FROM, state: null }
      for (const hours of [1, 1.01, 3.7, 9]) {
        progress = JSON.parse(JSON.stringify(progress)) as Progress
        await loggerOf(spec, target(), progress).postTo(FROM + hours * HOUR, FROM + hours * HOUR)
      }
      const whole = simulateBoat(spec, FROM, FROM + 9 * HOUR).samples
      expect(seen.flatMap(times)).toEqual(whole.map((each) => each.at))
    })

    it('cuts a long history into requests of some days', async () => {
      const progress: Progress = { postedTo: FROM, state: null }
      await loggerOf(boat(), target(), progress).postTo(FROM + 240 * HOUR, FROM + 240 * HOUR)
      expect(seen).toHaveLength(3)
      expect(progress.postedTo).toBe(FROM + 240 * HOUR)
    })

    it('out of reach keeps everything, and sends it in one request when back', async () => {
      const spec = boat({ late: [{ from: FROM + HOUR, to: FROM + 400 * HOUR }] })
      const progress: Progress = { postedTo: FROM, state: null }
      const logger = loggerOf(spec, target(), progress)
      await logger.postTo(FROM + 300 * HOUR, FROM + 300 * HOUR)
      expect(progress.postedTo).toBe(FROM + HOUR)
      await logger.postTo(FROM + 400 * HOUR, FROM + 400 * HOUR)
      expect(seen).toHaveLength(2)
      expect(times(seen[1] ?? { headers: {}, pack: [] }).length).toBeGreaterThan(399 * 240)
    })

    it('moves on only when the upload was taken, and passes over what is refused for good', async () => {
      const progress: Progress = { postedTo: FROM, state: null }
      answers = [json(403, {})]
      await expect(
        loggerOf(boat(), target(), progress).postTo(FROM + HOUR, FROM + HOUR),
      ).rejects.toMatchObject({ status: 403 })
      expect(progress.postedTo).toBe(FROM)
      answers = [json(422, {})]
      const refused: number[] = []
      await loggerOf(boat(), target(), progress).postTo(FROM + HOUR, FROM + HOUR, {
        onRefused: (error) => refused.push(error.status),
      })
      expect(refused).toEqual([422])
      expect(progress.postedTo).toBe(FROM + HOUR)
    })

    it('samples finer while it is asked to', async () => {
      const answer = accepted()
      answers = [
        json(200, {
          ...answer,
          next: { intervalSeconds: 1, until: new Date(FROM + 2 * HOUR).toISOString() },
        }),
      ]
      const logger = loggerOf(boat({ intervalSeconds: 60 }), target(), { postedTo: FROM, state: null })
      await logger.postTo(FROM + HOUR, FROM + HOUR)
      expect(logger.intervalSeconds()).toBe(1)
      await logger.postTo(FROM + 1.1 * HOUR, FROM + 1.1 * HOUR)
      expect(times(seen[1] ?? { headers: {}, pack: [] }).length).toBeGreaterThan(340)
      await logger.postTo(FROM + 1.2 * HOUR, FROM + 1.2 * HOUR)
      expect(times(seen[2] ?? { headers: {}, pack: [] }).length).toBeLessThan(10)
    })

    it("tells the time by its own clock, as far off as it was at the samples' end", async () => {
      const progress: Progress = { postedTo: FROM, state: null }
      await loggerOf(boat({ clock: driftingClock(40, FROM) }), target(), progress).postTo(
        FROM + 48 * HOUR,
        FROM + 48 * HOUR,
      )
      const ahead = Date.parse(seen[0]?.headers.date ?? '') - Date.now()
      expect(Math.abs(ahead - 80_000)).toBeLessThan(3000)
    })
  })
})
