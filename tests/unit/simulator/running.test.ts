import { spawn } from 'node:child_process'
import { mkdtempSync, rmSync, statSync, writeFileSync } from 'node:fs'
import { createServer } from 'node:http'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { gunzipSync } from 'node:zlib'
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest'
import { defaultBoat, simulateBoat } from '@/simulator/boat'
import { inParallel, paceClock } from '@/simulator/live'
import { loadState, saveState, type Saved } from '@/simulator/saved-state'

const FROM = Date.UTC(2026, 4, 3)

describe('the pace', () => {
  it('runs faster from the past until it meets the wall clock, then with it', () => {
    vi.useFakeTimers({ now: FROM })
    try {
      const clock = paceClock(FROM - 3_600_000, 61)
      expect(clock.now()).toBe(FROM - 3_600_000)
      expect(clock.speed()).toBe(61)
      vi.setSystemTime(FROM + 30_000)
      expect(clock.now()).toBe(FROM - 3_600_000 + 30_000 * 61)
      vi.setSystemTime(FROM + 90_000)
      expect(clock.now()).toBe(FROM + 90_000)
      expect(clock.speed()).toBe(1)
    } finally {
      vi.useRealTimers()
    }
  })

  it('does tasks so many at a time, each once', async () => {
    let running = 0
    let most = 0
    const done: number[] = []
    await inParallel([1, 2, 3, 4, 5], 2, async (item) => {
      running += 1
      most = Math.max(most, running)
      await Promise.resolve()
      done.push(item)
      running -= 1
    })
    expect(most).toBe(2)
    expect(done).toEqual([1, 2, 3, 4, 5])
  })
})

describe('the remembered state', () => {
  const folder = mkdtempSync(path.join(tmpdir(), 'simulator-'))
  afterAll(() => rmSync(folder, { recursive: true }))
  const file = path.join(folder, 'deep', 'state.json')

  it('comes back as it was, boats and all, and only its owner may read it', () => {
    const { end } = simulateBoat(defaultBoat(), FROM, FROM + 3_600_000)
    const system = { systemId: '1', loggerId: '2', key: 'k', postedTo: FROM + 3_600_000, state: end }
    const saved: Saved = {
      version: 1,
      anchorMs: FROM,
      timeZone: 'Etc/GMT+5',
      offsetSeconds: -18_000,
      vessels: { Petrichor: { vesselId: '1', storyTold: true, systems: [system] } },
    }
    saveState(file, saved)
    expect(loadState(file)).toEqual(saved)
    expect(statSync(file).mode & 0o777).toBe(0o600)
  })

  it('counts as none when absent, broken or of another version', () => {
    expect(loadState(null)).toBeNull()
    expect(loadState(path.join(folder, 'nothing.json'))).toBeNull()
    for (const text of ['{', '{"version":2}', '[]']) {
      writeFileSync(file, text)
      expect(loadState(file)).toBeNull()
    }
  })
})

describe('the command', () => {
  const packs: { key: string; records: number }[] = []
  let answerAfterMs = 0
  const server = createServer((request, response) => {
    const chunks: Buffer[] = []
    request.on('data', (chunk: Buffer) => chunks.push(chunk))
    request.on('end', () => {
      const pack = JSON.parse(gunzipSync(Buffer.concat(chunks)).toString()) as unknown[]
      packs.push({ key: request.headers.authorization ?? '', records: pack.length })
      const samples = {
        received: pack.length,
        stored: pack.length,
        duplicate: 0,
        conflicting: 0,
        rejected: 0,
      }
      setTimeout(() => {
        response.writeHead(200, { 'content-type': 'application/json' }).end(
          JSON.stringify({
            upload: '1',
            samples,
            rejected: [],
            rejectedRecords: 0,
            clock: { offsetSeconds: 0 },
            serverTime: new Date().toISOString(),
            next: { intervalSeconds: 60, until: null },
          }),
        )
      }, answerAfterMs)
    })
  })
  let url = ''
  beforeAll(async () => {
    await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve))
    const address = server.address()
    url = `http://127.0.0.1:${address !== null && typeof address === 'object' ? address.port : ''}`
  })
  afterAll(() => {
    server.closeAllConnections()
    server.close()
  })

  const run = (...parameters: string[]) => {
    const child = spawn(process.execPath, ['--import', 'tsx', 'simulator/main.ts', ...parameters], {
      env: { ...process.env, SIM_STATE: '' },
    })
    let output = ''
    child.stdout.on('data', (chunk: Buffer) => (output += chunk.toString()))
    child.stderr.on('data', (chunk: Buffer) => (output += chunk.toString()))
    const ended = new Promise<{ code: number | null; output: string }>((resolve) =>
      child.once('exit', (code) => resolve({ code, output })),
    )
    return { child, ended }
  }

  it('posts a history with a key and ends when told to do it once', async () => {
    packs.length = 0
    const { code, output } = await run('--url', url, '--key', 'abc', '--days', '2', '--once').ended
    expect(output).toMatch(/history: \d+ samples/)
    expect(code).toBe(0)
    expect(packs.every((pack) => pack.key === 'Bearer abc')).toBe(true)
    expect(packs.reduce((sum, pack) => sum + pack.records, 0)).toBeGreaterThan(2 * 1440 * 2)
  })

  it('goes on live until SIGTERM, finishes the upload in hand and ends with 0', async () => {
    packs.length = 0
    answerAfterMs = 400
    const { child, ended } = run(
      '--url',
      url,
      '--key',
      'abc',
      '--days',
      '1',
      '--interval',
      '1',
      '--batch',
      '1',
    )
    await vi.waitFor(() => expect(packs.length).toBeGreaterThan(5), { timeout: 20_000 })
    const askedAt = Date.now()
    child.kill('SIGTERM')
    expect((await ended).code).toBe(0)
    expect(Date.now() - askedAt).toBeLessThan(3000)
  })

  it('says how it is used when it is not told what to do, and what is wrong with a number', async () => {
    expect(await run().ended).toMatchObject({ code: 2 })
    const { code, output } = await run('--url', url, '--key', 'a', '--days', 'many').ended
    expect(code).toBe(1)
    expect(output).toContain('--days must be a number, not "many"')
  })
})
