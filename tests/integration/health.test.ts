import request from 'supertest'
import { describe, expect, it } from 'vitest'
import { serverUrl } from '../support/client'

describe('health', () => {
  it('says that all is ready, and no secrets', async () => {
    const answer = await request(serverUrl()).get('/api/health').expect(200)
    expect(answer.body).toEqual({
      database: 'ok',
      migrations: 'current',
      queueLagSeconds: expect.any(Number),
      lastTickAt: answer.body.lastTickAt === null ? null : expect.stringMatching(/^\d{4}-.*Z$/),
      backlog: expect.any(Number),
      zoneData: expect.any(String),
    })
    expect(answer.text).not.toMatch(/postgres:|password|secret/i)
  })
})
