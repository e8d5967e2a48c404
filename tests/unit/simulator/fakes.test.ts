import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest'
import { createServer, type Server } from 'node:http'
import nodemailer from 'nodemailer'
import twilio from 'twilio'
import { startMailFake, type MailFake } from '@/simulator/fakes/mail'
import { startSmsFake, type SmsFake } from '@/simulator/fakes/sms'

describe('the mail fake', () => {
  let fake: MailFake
  beforeAll(async () => {
    fake = await startMailFake()
  })
  afterAll(() => fake.stop())
  afterEach(() => fake.clear())

  const send = (subject: string) => {
    const transport = nodemailer.createTransport({
      host: '127.0.0.1',
      port: fake.port,
      secure: false,
      ignoreTLS: true,
      socketTimeout: 300,
    })
    return transport
      .sendMail({
        from: 'Watch <watch@middlewatch.example>',
        to: 'owner@saltern.example',
        subject,
        text: 'Quiet tonight. Überall.',
        html: '<p>Quiet tonight.</p>',
        messageId: '<17@middlewatch.example>',
      })
      .finally(() => transport.close())
  }

  it('keeps envelope, headers and decoded text of what a real client sends', async () => {
    await send('Tonight: Saltmarsh Hare')
    expect(fake.messages()).toMatchObject([
      {
        from: 'watch@middlewatch.example',
        to: ['owner@saltern.example'],
        subject: 'Tonight: Saltmarsh Hare',
        messageId: '<17@middlewatch.example>',
        text: expect.stringContaining('Quiet tonight. Überall.') as string,
        html: expect.stringContaining('<p>Quiet tonight.</p>') as string,
        answered: true,
      },
    ])
  })

  it('refuses for now, rejects for good, and then takes again', async () => {
    fake.failNext('refuse')
    fake.failNext('reject')
    await expect(send('one')).rejects.toMatchObject({ responseCode: 451 })
    await expect(send('two')).rejects.toMatchObject({ responseCode: 550 })
    await send('three')
    expect(fake.messages().map((mail) => mail.subject)).toEqual(['three'])
  })

  it('drops the connection after taking: the sender hears an error, the mail is there', async () => {
    fake.failNext('drop')
    await expect(send('taken')).rejects.toThrow()
    expect(fake.messages()).toMatchObject([{ subject: 'taken', answered: false }])
  })

  it('never answers when told to time out', async () => {
    fake.failNext('time-out')
    await expect(send('lost')).rejects.toMatchObject({ code: 'ETIMEDOUT' })
    expect(fake.messages()).toEqual([])
  })
})

describe('the SMS fake', () => {
  const account = `AC${'0'.repeat(32)}`
  const token = 'token-of-a-test'
  let fake: SmsFake
  let hook: Server
  let hookUrl = ''
  const heard: { signature: string; fields: Record<string, string> }[] = []

  beforeAll(async () => {
    fake = await startSmsFake({ authToken: token, callbackDelayMs: 0 })
    hook = createServer((request, response) => {
      let body = ''
      request.on('data', (chunk: Buffer) => (body += chunk.toString()))
      request.on('end', () => {
        heard.push({
          signature: String(request.headers['x-twilio-signature']),
          fields: Object.fromEntries(new URLSearchParams(body)),
        })
        response.writeHead(204).end()
      })
    })
    await new Promise<void>((resolve) => hook.listen(0, '127.0.0.1', resolve))
    const address = hook.address()
    hookUrl = `http://127.0.0.1:${typeof address === 'object' ? address?.port : ''}/hook?message=42`
  })
  afterAll(async () => {
    hook.close()
    await fake.stop()
  })
  afterEach(() => {
    fake.clear()
    heard.length = 0
  })

  const client = (withToken = token) => {
    const made = twilio(account, withToken, { timeout: 300, autoRetry: false })
    made.api.baseUrl = `http://127.0.0.1:${fake.port}`
    return made
  }
  const text = { to: '+12025550123', from: '+12025550100', body: 'Petrichor: pump may run 3x tonight' }

  it('answers the SDK and reports delivery with a signature the SDK accepts', async () => {
    const message = await client().messages.create({ ...text, statusCallback: hookUrl })
    expect(message.status).toBe('queued')
    await fake.settled()
    expect(fake.messages()).toMatchObject([
      { sid: message.sid, ...text, status: 'delivered', answered: true },
    ])
    expect(heard.map((each) => each.fields.MessageStatus)).toEqual(['sent', 'delivered'])
    for (const each of heard) {
      expect(each.fields.MessageSid).toBe(message.sid)
      expect(twilio.validateRequest(token, each.signature, hookUrl, each.fields)).toBe(true)
      expect(twilio.validateRequest('another', each.signature, hookUrl, each.fields)).toBe(false)
    }
    expect(fake.callbacks().map((each) => each.answer)).toEqual([204, 204])
    expect((await client().messages(message.sid).fetch()).status).toBe('delivered')
  })

  it("hands a subscriber's answer to the webhook, signed", async () => {
    expect(await fake.reply(hookUrl, { from: text.to, to: text.from, body: 'OK' })).toBe(204)
    const [each] = heard
    expect(each?.fields).toMatchObject({ From: text.to, Body: 'OK' })
    expect(twilio.validateRequest(token, each?.signature ?? '', hookUrl, each?.fields ?? {})).toBe(true)
  })

  it('refuses a wrong token', async () => {
    await expect(client('wrong').messages.create(text)).rejects.toMatchObject({ status: 401, code: 20003 })
  })

  it('fails as planned: 503, 400, cut off after taking, no answer', async () => {
    for (const mode of ['refuse', 'reject', 'drop', 'time-out'] as const) fake.failNext(mode)
    await expect(client().messages.create(text)).rejects.toMatchObject({ status: 503 })
    await expect(client().messages.create(text)).rejects.toMatchObject({ status: 400, code: 21211 })
    await expect(client().messages.create(text)).rejects.toThrow()
    await expect(client().messages.create(text)).rejects.toThrow(/timeout/)
    expect(fake.messages()).toMatchObject([{ body: text.body, answered: false }])
    await fake.settled()
  })
})
