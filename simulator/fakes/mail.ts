import type { AddressInfo } from 'node:net'
import PostalMime from 'postal-mime'
import { SMTPServer, type SMTPServerSession } from 'smtp-server'
import { failureQueue, type FailureMode } from './failure-queue'

export type ReceivedMail = {
  receivedAt: number
  /** The envelope, which is what counts for delivery. */
  from: string
  to: string[]
  messageId: string | null
  subject: string
  text: string
  html: string
  headers: Record<string, string>
  raw: string
  /** Whether the sender was told that it was taken. */
  answered: boolean
}

export type MailFake = {
  port: number
  /** Everything taken so far, oldest first. */
  messages: () => ReceivedMail[]
  /** Makes the next `count` messages fail. */
  failNext: (mode: FailureMode, count?: number) => void
  clear: () => void
  stop: () => Promise<void>
}

const ANSWERS = {
  refuse: { code: 451, text: 'Local trouble, try again later' },
  reject: { code: 550, text: 'No such mailbox here' },
}

/** A mail server on loopback that speaks SMTP and keeps what it is sent. `port` 0 takes a free one. */
export async function startMailFake(options: { port?: number; keep?: number } = {}): Promise<MailFake> {
  const received: ReceivedMail[] = []
  const failures = failureQueue()
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS', 'AUTH'],
    disableReverseLookup: true,
    logger: false,
    closeTimeout: 200,
    onData(stream, session, done) {
      const chunks: Buffer[] = []
      stream.on('data', (chunk: Buffer) => chunks.push(chunk))
      stream.on('end', () => {
        const failure = failures.take()
        if (failure === 'refuse' || failure === 'reject') {
          const answer = ANSWERS[failure]
          return done(Object.assign(new Error(answer.text), { responseCode: answer.code }))
        }
        if (failure === 'time-out') return
        void read(Buffer.concat(chunks), session, failure === null).then((mail) => {
          received.push(mail)
          if (received.length > (options.keep ?? 2000)) received.shift()
          if (failure === 'drop') cutConnection(server, session)
          else done(null)
        }, done)
      })
    },
  })
  // A client that goes away in the middle is its own trouble; without a listener it would end the process.
  server.on('error', () => undefined)
  await new Promise<void>((resolve, reject) => {
    server.server.once('error', reject)
    server.listen(options.port ?? 0, '127.0.0.1', () => {
      server.server.off('error', reject)
      resolve()
    })
  })
  const address: AddressInfo | string | null = server.server.address()
  return {
    port: address !== null && typeof address === 'object' ? address.port : (options.port ?? 0),
    messages: () => [...received],
    failNext: failures.plan,
    clear: () => {
      received.length = 0
      failures.clear()
    },
    stop: () => new Promise((resolve) => server.close(() => resolve())),
  }
}

async function read(raw: Buffer, session: SMTPServerSession, answered: boolean): Promise<ReceivedMail> {
  const parsed = await PostalMime.parse(raw)
  const sender = session.envelope.mailFrom
  return {
    receivedAt: Date.now(),
    from: sender ? sender.address : '',
    to: session.envelope.rcptTo.map((recipient) => recipient.address),
    messageId: parsed.messageId ?? null,
    subject: parsed.subject ?? '',
    text: parsed.text ?? '',
    html: parsed.html ?? '',
    headers: Object.fromEntries(parsed.headers.map((header) => [header.key, header.value])),
    raw: raw.toString('utf8'),
    answered,
  }
}

function cutConnection(server: SMTPServer, session: SMTPServerSession): void {
  for (const connection of server.connections) {
    if ('id' in connection && connection.id === session.id && '_socket' in connection) {
      const socket = connection._socket
      if (socket instanceof Object && 'destroy' in socket && typeof socket.destroy === 'function')
        socket.destroy()
    }
  }
}
