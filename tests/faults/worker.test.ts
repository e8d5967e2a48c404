import { spawn, type ChildProcess } from 'node:child_process'
import path from 'node:path'
import { afterAll, afterEach, beforeAll, describe, expect, inject, it } from 'vitest'
import { asIngest } from '@/db/roles'
import { queueMail, queueText } from '@/lib/messages/queue-mail'
import { giveUp } from '@/lib/messages/sending'
import { resendMessage } from '@/lib/messages/resend-message'
import { startMailFake, type MailFake } from '@/simulator/fakes/mail'
import { startSmsFake, type SmsFake } from '@/simulator/fakes/sms'
import { testDatabase, useDatabase, type TestDatabase } from '../support/database'
import { SMS_TOKEN } from '../support/settings'

const ROOT = path.resolve(import.meta.dirname, '../..')

let database: TestDatabase
let mail: MailFake
let sms: SmsFake
const children: ChildProcess[] = []

beforeAll(async () => {
  database = await testDatabase()
  await useDatabase(database.url)
  mail = await startMailFake({ port: 0 })
  sms = await startSmsFake({ port: 0, authToken: SMS_TOKEN, callbackDelayMs: 0 })
})
afterAll(async () => {
  await Promise.all([mail.stop(), sms.stop()])
  await useDatabase(inject('settings').databaseUrl)
  await database.drop()
})
afterEach(async () => {
  for (const child of children.splice(0)) await end(child, 'SIGKILL')
  mail.clear()
  sms.clear()
  await database.knex.raw('truncate message cascade')
  await database.knex.raw('truncate queue.job cascade')
})

/** A worker process of its own, ready. */
async function worker(): Promise<ChildProcess> {
  const child = spawn(process.execPath, ['--import', 'tsx', 'lib/run/worker.ts'], {
    cwd: ROOT,
    env: {
      ...process.env,
      DATABASE_URL: database.url,
      SMTP_URL: `smtp://127.0.0.1:${mail.port}`,
      TWILIO_API_URL: `http://127.0.0.1:${sms.port}`,
    },
    stdio: ['ignore', 'pipe', 'inherit'],
  })
  children.push(child)
  await new Promise<void>((resolve, reject) => {
    child.stdout?.on('data', (chunk: Buffer) => {
      if (chunk.toString().includes('worker ready')) resolve()
    })
    child.once('exit', (code) => reject(new Error(`the worker ended with ${code}`)))
  })
  return child
}

function end(child: ChildProcess, signal: NodeJS.Signals): Promise<number | null> {
  if (child.exitCode !== null || child.signalCode !== null) return Promise.resolve(child.exitCode)
  const gone = new Promise<number | null>((resolve) => child.once('exit', (code) => resolve(code)))
  child.kill(signal)
  return gone
}

/** Asks until it is so; the time limit is the test's own. */
async function until(isSo: () => boolean | Promise<boolean>): Promise<void> {
  while (!(await isSo())) await new Promise((resolve) => setTimeout(resolve, 50))
}

const letterTo = (name: string) =>
  asIngest((trx) =>
    queueMail(
      trx,
      {
        personId: null,
        to: `${name}@boats.example`,
        subject: `For ${name}`,
        paragraphs: ['A line.'],
        purpose: 'account',
      },
      new Date(),
    ),
  )
const textTo = (to: string) =>
  asIngest((trx) =>
    queueText(trx, { personId: null, to, body: 'Your code is 123456', purpose: 'account' }, new Date()),
  )

const accepted = async (): Promise<number> =>
  (await database.knex('message').whereNotNull('accepted_at')).length

describe('the worker process', () => {
  it('sends what waits within seconds and ends cleanly when asked to', async () => {
    await letterTo('ada')
    await textTo('+12025550101')
    const child = await worker()
    await until(async () => (await accepted()) === 2)
    expect(mail.messages()).toHaveLength(1)
    expect(sms.messages()).toHaveLength(1)
    expect(await end(child, 'SIGTERM')).toBe(0)
  })

  it('two of them send nothing twice', async () => {
    await Promise.all([worker(), worker()])
    const names = Array.from({ length: 20 }, (_, index) => `person${index}`)
    for (const name of names) await letterTo(name)
    await until(async () => (await accepted()) === names.length)
    expect(mail.messages().map((letter) => letter.to[0])).toHaveLength(names.length)
    expect(new Set(mail.messages().map((letter) => letter.to[0])).size).toBe(names.length)
  })

  it('killed while the service answers, the next one sends again: at most one double, and nothing is lost', async () => {
    const first = await worker()
    // The service takes the text and its answer never arrives: the process dies in between.
    sms.failNext('time-out')
    await textTo('+12025550102')
    await until(async () => {
      const jobs = await database.knex('queue.job').where({ name: 'message', state: 'active' })
      return jobs.length === 1
    })
    await end(first, 'SIGKILL')
    await worker()
    await until(async () => (await accepted()) === 1)
    expect(sms.messages().length).toBeLessThanOrEqual(2)
    expect(sms.messages().length).toBeGreaterThanOrEqual(1)
  }, 90_000)

  it('killed between acceptance and the note of it, sends once more and no oftener', async () => {
    const first = await worker()
    const id = await letterTo('ada')
    await until(() => mail.messages().length === 1)
    await end(first, 'SIGKILL')
    // As a kill in that instant leaves it: taken by the service, unknown to us, its job still in hand.
    await database.knex('message').where({ id }).update({ accepted_at: null, service_id: null })
    await database.knex('delivery_attempt').delete()
    await database
      .knex('queue.job')
      .where({ name: 'message' })
      .update({
        state: 'active',
        completed_on: null,
        started_on: new Date(Date.now() - 60_000),
      })
    await worker()
    await until(async () => (await accepted()) === 1)
    expect(mail.messages()).toHaveLength(2)
    expect(new Set(mail.messages().map((letter) => letter.messageId)).size).toBe(1)
  }, 90_000)

  it('a refused message is tried again by itself', async () => {
    mail.failNext('refuse')
    await letterTo('ada')
    await worker()
    await until(async () => (await accepted()) === 1)
    expect(mail.messages()).toHaveLength(1)
    const outcomes = await database.knex('delivery_attempt').orderBy('id').pluck('outcome')
    expect(outcomes).toEqual(['failed', 'accepted'])
  }, 90_000)

  it('a message whose tries are used up ends in the list of the dead, and can be sent again from there', async () => {
    mail.failNext('refuse', 2)
    const id = await letterTo('ada')
    // All tries but the last have been used.
    await database.knex('queue.job').where({ name: 'message' }).update({ retry_limit: 0 })
    await worker()
    await until(async () => (await database.knex('message').where({ id }).first()).failed_at !== null)
    const dead = await database.knex('message').where({ id }).first()
    expect(dead.failure).toMatch(/given up/)
    expect(mail.messages()).toHaveLength(0)
    mail.clear()
    expect(await asIngest((trx) => resendMessage(trx, id, new Date()))).toBe(true)
    await until(async () => (await accepted()) === 1)
    expect(mail.messages()).toHaveLength(1)
    expect(await asIngest((trx) => resendMessage(trx, id, new Date()))).toBe(false)
  }, 90_000)

  it('giving up leaves alone what was accepted after all', async () => {
    const id = await letterTo('ada')
    await database.knex('message').where({ id }).update({ accepted_at: new Date() })
    await giveUp(id, new Date())
    expect((await database.knex('message').where({ id }).first()).failed_at).toBeNull()
  })
})
