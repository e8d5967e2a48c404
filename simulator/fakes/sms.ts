import { randomBytes } from 'node:crypto'
import { createServer, type IncomingMessage, type ServerResponse } from 'node:http'
import { failureQueue, type FailureMode } from './failure-queue'
import { postSigned } from './sms-signature'

export type SmsStatus = 'queued' | 'sent' | 'delivered' | 'undelivered' | 'failed'
export type ReceivedSms = {
  sid: string
  receivedAt: number
  to: string
  from: string
  body: string
  statusCallback: string | null
  status: SmsStatus
  /** Whether the sender was told that it was taken. */
  answered: boolean
}

export type SmsFakeOptions = {
  port?: number
  authToken: string
  /** Last word on each message. Default `delivered`. */
  outcome?: (message: ReceivedSms) => 'delivered' | 'undelivered' | 'failed'
  /** Wait before the status callbacks, ms. Default 50. */
  callbackDelayMs?: number
  keep?: number
}

export type SmsFake = {
  port: number
  messages: () => ReceivedSms[]
  failNext: (mode: FailureMode, count?: number) => void
  /** A text from a subscriber to the service's number, handed on to the app's webhook. Resolves with its HTTP status. */
  reply: (webhookUrl: string, text: { from: string; to: string; body: string }) => Promise<number>
  /** Status callbacks that were made, with the answer they got. */
  callbacks: () => { sid: string; status: SmsStatus; answer: number }[]
  /** Resolves when no callback is outstanding. */
  settled: () => Promise<void>
  clear: () => void
  stop: () => Promise<void>
}

const MESSAGES_PATH = /^\/2010-04-01\/Accounts\/(AC[0-9a-zA-Z]+)\/Messages(?:\/(SM[0-9a-f]+))?\.json$/

/** The hosted SMS service's message resource over HTTP on loopback: takes, keeps, and reports delivery. */
export async function startSmsFake(options: SmsFakeOptions): Promise<SmsFake> {
  const received: ReceivedSms[] = []
  const callbacks: { sid: string; status: SmsStatus; answer: number }[] = []
  const failures = failureQueue()
  const outstanding = new Set<Promise<void>>()
  const timers = new Set<NodeJS.Timeout>()

  const server = createServer((request, response) => {
    void serve(request, response).catch(() => response.destroy())
  })

  async function serve(request: IncomingMessage, response: ServerResponse): Promise<void> {
    const url = new URL(request.url ?? '/', 'http://fake')
    const match = MESSAGES_PATH.exec(url.pathname)
    const fields = new URLSearchParams(await bodyOf(request))
    if (!match) return problem(response, 404, 20404, `The requested resource ${url.pathname} was not found`)
    const [, accountSid = '', sid] = match
    if (!isAuthorized(request, accountSid, options.authToken)) {
      return problem(response, 401, 20003, 'Authenticate')
    }
    if (request.method === 'GET' && sid) {
      const found = received.find((message) => message.sid === sid)
      if (!found) return problem(response, 404, 20404, `The requested resource ${url.pathname} was not found`)
      return json(response, 200, resourceOf(found, accountSid))
    }
    if (request.method !== 'POST' || sid) return problem(response, 405, 20004, 'Method not allowed')
    take(fields, accountSid, response)
  }

  function take(fields: URLSearchParams, accountSid: string, response: ServerResponse): void {
    const failure = failures.take()
    if (failure === 'refuse') return problem(response, 503, 20503, 'Service unavailable')
    if (failure === 'reject')
      return problem(response, 400, 21211, "The 'To' number is not a valid phone number.")
    if (failure === 'time-out') return
    const to = fields.get('To')
    const body = fields.get('Body')
    if (!to) return problem(response, 400, 21604, "A 'To' phone number is required.")
    if (!body) return problem(response, 400, 21602, 'Message body is required.')
    const message: ReceivedSms = {
      sid: `SM${randomBytes(16).toString('hex')}`,
      receivedAt: Date.now(),
      to,
      from: fields.get('From') ?? '',
      body,
      statusCallback: fields.get('StatusCallback'),
      status: 'queued',
      answered: failure === null,
    }
    received.push(message)
    if (received.length > (options.keep ?? 2000)) received.shift()
    if (failure === 'drop') response.destroy()
    else json(response, 201, resourceOf(message, accountSid))
    const report = reportLater(message, accountSid).finally(() => outstanding.delete(report))
    outstanding.add(report)
  }

  async function reportLater(message: ReceivedSms, accountSid: string): Promise<void> {
    await pause(options.callbackDelayMs ?? 50)
    const last = options.outcome?.(message) ?? 'delivered'
    for (const status of ['sent', last] as const) {
      message.status = status
      if (!message.statusCallback) continue
      const answer = await postSigned(options.authToken, message.statusCallback, {
        SmsSid: message.sid,
        MessageSid: message.sid,
        SmsStatus: status,
        MessageStatus: status,
        To: message.to,
        From: message.from,
        AccountSid: accountSid,
        ApiVersion: '2010-04-01',
        ...(status === 'undelivered' || status === 'failed' ? { ErrorCode: '30003' } : {}),
      })
      callbacks.push({ sid: message.sid, status, answer })
    }
  }

  /** A wait that `stop` can end. */
  const pause = (ms: number): Promise<void> =>
    new Promise((resolve) => {
      const timer = setTimeout(() => {
        timers.delete(timer)
        resolve()
      }, ms)
      timers.add(timer)
    })

  const port = await new Promise<number>((resolve, reject) => {
    server.once('error', reject)
    server.listen(options.port ?? 0, '127.0.0.1', () => {
      const address = server.address()
      resolve(address !== null && typeof address === 'object' ? address.port : (options.port ?? 0))
    })
  })

  return {
    port,
    messages: () => received.map((message) => ({ ...message })),
    failNext: failures.plan,
    reply: (webhookUrl, text) => {
      const sid = `SM${randomBytes(16).toString('hex')}`
      return postSigned(options.authToken, webhookUrl, {
        MessageSid: sid,
        SmsSid: sid,
        AccountSid: `AC${'0'.repeat(32)}`,
        From: text.from,
        To: text.to,
        Body: text.body,
        NumMedia: '0',
        NumSegments: '1',
        ApiVersion: '2010-04-01',
      })
    },
    callbacks: () => [...callbacks],
    settled: async () => {
      while (outstanding.size > 0) await Promise.all(outstanding)
    },
    clear: () => {
      received.length = 0
      callbacks.length = 0
      failures.clear()
    },
    stop: async () => {
      for (const timer of timers) clearTimeout(timer)
      timers.clear()
      const closed = new Promise<void>((resolve) => server.close(() => resolve()))
      server.closeAllConnections()
      await closed
    },
  }
}

async function bodyOf(request: IncomingMessage): Promise<string> {
  let text = ''
  request.setEncoding('utf8')
  for await (const chunk of request) text += String(chunk)
  return text
}

function isAuthorized(request: IncomingMessage, accountSid: string, authToken: string): boolean {
  const [scheme, credentials = ''] = (request.headers.authorization ?? '').split(' ')
  return (
    scheme === 'Basic' && Buffer.from(credentials, 'base64').toString('utf8') === `${accountSid}:${authToken}`
  )
}

const segments = (body: string): number => (body.length <= 160 ? 1 : Math.ceil(body.length / 153))

function resourceOf(message: ReceivedSms, accountSid: string): Record<string, unknown> {
  const created = new Date(message.receivedAt).toUTCString().replace('GMT', '+0000')
  const uri = `/2010-04-01/Accounts/${accountSid}/Messages/${message.sid}`
  return {
    sid: message.sid,
    account_sid: accountSid,
    messaging_service_sid: null,
    to: message.to,
    from: message.from,
    body: message.body,
    status: message.status,
    num_segments: String(segments(message.body)),
    num_media: '0',
    direction: 'outbound-api',
    api_version: '2010-04-01',
    price: null,
    price_unit: 'USD',
    error_code: null,
    error_message: null,
    date_created: created,
    date_updated: created,
    date_sent: null,
    uri: `${uri}.json`,
    subresource_uris: { media: `${uri}/Media.json` },
  }
}

function json(response: ServerResponse, status: number, value: unknown): void {
  response.writeHead(status, { 'content-type': 'application/json' })
  response.end(JSON.stringify(value))
}

const problem = (response: ServerResponse, status: number, code: number, message: string): void =>
  json(response, status, { code, message, more_info: '', status })
