import nodemailer from 'nodemailer'
import twilio from 'twilio'
import type { Environment } from '@/lib/env'
import { SERVICE_TIMEOUT_MS } from '@/lib/messages/queue-settings'
import type { Attachment } from '@/db/queries/message-queue'

export interface OutgoingMail {
  to: string
  subject: string
  text: string
  html: string | null
  /** Without angle brackets; the same at every try, so that a double can be told. */
  messageId: string
  attachments: Attachment[]
}

export interface OutgoingText {
  to: string
  body: string
  /** Where the service reports what became of it; names the message. */
  statusCallback: string
}

/** The two services by which messages leave. Each answers the service's own id, or throws `SendError`. */
export interface Services {
  sendMail(mail: OutgoingMail): Promise<string>
  sendText(text: OutgoingText): Promise<string>
  close(): void
}

/** Why a service did not take a message. `lasting`: trying again would end the same. */
export class SendError extends Error {
  constructor(
    message: string,
    readonly lasting: boolean,
    /** The number has told the service to send nothing more. */
    readonly stopped = false,
  ) {
    super(message)
  }
}

export type ServiceSettings = Pick<Environment, 'smtp' | 'sms'>

/**
 * Opens the services that the environment names. One that is not set up throws when it is used, so that the
 * other still serves.
 */
export function openServices(settings: ServiceSettings): Services {
  const mail = openMail(settings.smtp)
  const text = openText(settings.sms)
  return { sendMail: mail.send, sendText: text, close: mail.close }
}

function openMail(smtp: ServiceSettings['smtp']): { send: Services['sendMail']; close: () => void } {
  const address = smtp.url ?? (smtp.host === undefined ? undefined : addressOf(smtp.host, smtp))
  if (address === undefined) {
    return { send: () => Promise.reject(notSetUp('SMTP_URL or SMTP_HOST')), close: () => {} }
  }
  const here = /^smtp:\/\/([^@/]*@)?(127\.|localhost|\[::1\])/.test(address)
  const transport = nodemailer.createTransport({
    url: address,
    // A server on this machine is reached without encryption; any other must offer it.
    ignoreTLS: here,
    requireTLS: !here && address.startsWith('smtp://'),
    connectionTimeout: SERVICE_TIMEOUT_MS / 2,
    greetingTimeout: SERVICE_TIMEOUT_MS / 2,
    socketTimeout: SERVICE_TIMEOUT_MS,
  })
  return {
    send: async (mail) => {
      const sending = transport.sendMail({
        from: smtp.from,
        to: mail.to,
        subject: mail.subject,
        text: mail.text,
        ...(mail.html === null ? {} : { html: mail.html }),
        messageId: `<${mail.messageId}>`,
        headers: { 'Auto-Submitted': 'auto-generated' },
        attachments: mail.attachments.map((file) => ({
          filename: file.filename,
          contentType: file.contentType,
          content: Buffer.from(file.base64, 'base64'),
        })),
      })
      const info = await within(SERVICE_TIMEOUT_MS, sending).catch((error: unknown) => {
        throw mailError(error)
      })
      return info.messageId
    },
    close: () => transport.close(),
  }
}

/** SMTP says 4xx for "later" and 5xx for "never" (RFC 5321, 4.2.1); a broken connection is "later". */
function mailError(error: unknown): SendError {
  const code = numberOf(error, 'responseCode')
  return new SendError(textOf(error), code !== null && code >= 500)
}

function addressOf(host: string, smtp: ServiceSettings['smtp']): string {
  const who =
    smtp.user === undefined ? '' : `${encodeURIComponent(smtp.user)}:${encodeURIComponent(smtp.pass ?? '')}@`
  return `${smtp.port === 465 ? 'smtps' : 'smtp'}://${who}${host}:${smtp.port}`
}

function openText(sms: ServiceSettings['sms']): Services['sendText'] {
  const { accountSid, authToken, from } = sms
  if (accountSid === undefined || authToken === undefined || from === undefined) {
    return () => Promise.reject(notSetUp('TWILIO_ACCOUNT_SID, TWILIO_AUTH_TOKEN or TWILIO_FROM'))
  }
  const client = twilio(accountSid, authToken, { timeout: SERVICE_TIMEOUT_MS })
  if (sms.apiUrl !== undefined) client.api.baseUrl = sms.apiUrl.replace(/\/$/, '')
  return async (text) => {
    const sending = client.messages.create({
      to: text.to,
      from,
      body: text.body,
      statusCallback: text.statusCallback,
    })
    const taken = await within(SERVICE_TIMEOUT_MS, sending).catch((error: unknown) => {
      throw textError(error)
    })
    return taken.sid
  }
}

/** The service's code for a number that answered STOP, value from memory. */
const STOPPED_CODE = 21610

function textError(error: unknown): SendError {
  const status = numberOf(error, 'status')
  const lasting =
    status !== null && status >= 400 && status < 500 && ![401, 403, 404, 408, 429].includes(status)
  return new SendError(textOf(error), lasting, numberOf(error, 'code') === STOPPED_CODE)
}

const notSetUp = (name: string) => new SendError(`not set up: ${name}`, false)
const textOf = (error: unknown): string => (error instanceof Error ? error.message : String(error))

function numberOf(error: unknown, key: 'responseCode' | 'status' | 'code'): number | null {
  if (typeof error !== 'object' || error === null || !(key in error)) return null
  // The key was looked for one line above; only the value's type is open.
  const value = (error as Record<string, unknown>)[key]
  return typeof value === 'number' ? value : null
}

function within<T>(milliseconds: number, work: Promise<T>): Promise<T> {
  let timer: NodeJS.Timeout | undefined
  const late = new Promise<never>((_, reject) => {
    timer = setTimeout(() => reject(new Error(`no answer within ${milliseconds / 1000} s`)), milliseconds)
  })
  return Promise.race([work, late]).finally(() => clearTimeout(timer))
}
