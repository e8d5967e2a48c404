import { describe, expect, it } from 'vitest'
import { readEnvironment } from '@/lib/env'

const production = {
  DATABASE_URL: 'postgres://watch@db.example/middlewatch',
  APP_URL: 'https://watch.example/',
  NEXTAUTH_SECRET: 'a-secret-of-at-least-thirty-two-characters',
}

describe('the mode', () => {
  it('is demo without a database and production with one', () => {
    expect(readEnvironment({}).mode).toBe('demo')
    expect(readEnvironment(production).mode).toBe('production')
    expect(readEnvironment({ ...production, MODE: 'test' }).mode).toBe('test')
  })
  it('is refused when it is none of the three', () => {
    expect(() => readEnvironment({ MODE: 'staging' })).toThrow(/MODE/)
  })
})

describe('production', () => {
  it('does not start without a secret of its own', () => {
    for (const secret of [undefined, '', 'short', readEnvironment({}).secret])
      expect(() => readEnvironment({ ...production, NEXTAUTH_SECRET: secret })).toThrow(/NEXTAUTH_SECRET/)
  })
  it('does not start without its address, or with a stand-in for the text service', () => {
    expect(() => readEnvironment({ ...production, APP_URL: undefined })).toThrow(/APP_URL/)
    expect(() => readEnvironment({ ...production, TWILIO_API_URL: 'http://127.0.0.1:1' })).toThrow(
      /TWILIO_API_URL/,
    )
  })
  it('never tells the secret in what it says', () => {
    const secret = 'too-short-secret'
    expect(() => readEnvironment({ ...production, NEXTAUTH_SECRET: secret })).not.toThrow(secret)
  })
})

describe('the rest', () => {
  it('has usual values, and no slash after the address', () => {
    expect(readEnvironment(production).appUrl).toBe('https://watch.example')
    expect(readEnvironment({ PORT: '3100' })).toMatchObject({
      port: 3100,
      appUrl: 'http://127.0.0.1:3100',
      retentionDays: 400,
      demoPassword: 'middle-watch-demo',
    })
  })
  it('names what is wrong', () => {
    expect(() => readEnvironment({ PORT: 'door', RETENTION_DAYS: '30' })).toThrow(/PORT.*RETENTION_DAYS/)
  })
})
