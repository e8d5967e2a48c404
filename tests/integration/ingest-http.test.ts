import { gzipSync } from 'node:zlib'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Knex } from '@/db/knex'
import { newBoat, readingsOf, senml, type Boat, type Reading, type Sent } from '../support/boats'
import { serverUrl } from '../support/client'
import { serverDatabase } from '../support/database'

const FROM_SECONDS = Math.floor(Date.now() / 1000) - 30 * 3600

let knex: Knex
let boat: Boat

beforeAll(async () => {
  knex = serverDatabase()
  boat = await newBoat(knex)
})
afterAll(() => knex.destroy())

const post = async (body: BodyInit, headers: Record<string, string> = {}): Promise<Sent> => {
  const answer = await fetch(`${serverUrl()}/api/ingest`, {
    method: 'POST',
    headers: { authorization: `Bearer ${boat.key}`, 'content-type': 'application/senml+json', ...headers },
    body,
  })
  return { status: answer.status, headers: answer.headers, body: await answer.json() }
}

describe('POST /api/ingest over HTTP', () => {
  it('takes a packed day and shows it at once', async () => {
    const story = readingsOf({ fromSeconds: FROM_SECONDS, hours: 29, seed: 8 })
    const pack = gzipSync(JSON.stringify(senml(boat.serial, story)))
    const { status, body, headers } = await post(new Uint8Array(pack), { 'content-encoding': 'gzip' })
    expect(status).toBe(200)
    expect(headers.get('content-type')).toMatch(/^application\/json/)
    expect(body.samples).toMatchObject({ received: story.length, stored: story.length, rejected: 0 })
    const runs = await knex('run').where({ system_id: boat.systemId })
    expect(runs.length).toBeGreaterThan(4)
  })

  it('takes several uploads of one logger at the same moment', async () => {
    const story = readingsOf({ fromSeconds: FROM_SECONDS + 29.2 * 3600, hours: 0.5, seed: 9 })
    const sent = async (reading: Reading): Promise<Sent> => {
      const answer = await post(JSON.stringify(senml(boat.serial, [reading])))
      // A busy server asks to come again, and loggers do.
      return answer.status === 503 ? sent(reading) : answer
    }
    const answers = await Promise.all(story.map(sent))
    expect(answers.map(({ status }) => status)).toEqual(story.map(() => 200))
    expect(answers.reduce((sum, { body }) => sum + (body.samples?.stored ?? 0), 0)).toBe(story.length)
  })

  it('stops a body that is too large, though it grew while it was sent', async () => {
    const { status, body } = await post(new Uint8Array(9 * 1024 * 1024))
    expect(status).toBe(413)
    expect(body.type).toMatch(/too-large$/)
  })

  it('refuses other methods with problem details', async () => {
    const answer = await fetch(`${serverUrl()}/api/ingest`)
    expect(answer.status).toBe(405)
    expect(answer.headers.get('content-type')).toBe('application/problem+json')
    expect(answer.headers.get('allow')).toMatch(/POST/)
  })
})
