import type { Attachment, Purpose } from '@/db/queries/message-queue'
import { insertMessage } from '@/db/queries/message-queue'
import type { Trx } from '@/db/roles'
import { enqueue } from '@/lib/messages/queue'
import { plainEmail } from '@/lib/messages/emails/plain-email'

export interface PlainMail {
  /** Null for somebody without an account. */
  personId: string | null
  to: string
  subject: string
  /** Paragraphs of plain sentences. */
  paragraphs: string[]
  /** The one thing to do, as a link. */
  action?: { label: string; url: string }
  purpose: Exclude<Purpose, 'notice'>
  attachments?: Attachment[]
}

/**
 * Writes and queues a mail that is about no notice: an invitation, a password reset, a report.
 * @param trx under the service's role; the mail leaves only if it commits.
 * @returns the message's id.
 * @example await queueMail(trx, { personId, to, subject: 'Your new password', paragraphs: ['…'], purpose: 'account' }, now)
 */
export async function queueMail(trx: Trx, mail: PlainMail, now: Date): Promise<string> {
  const { text, html } = await plainEmail(mail)
  const messageId = await insertMessage(trx, {
    personId: mail.personId,
    channel: 'email',
    address: mail.to,
    subject: mail.subject,
    bodyText: text,
    bodyHtml: html,
    queuedAt: now,
    sendAfter: now,
    urgency: 'now',
    purpose: mail.purpose,
    usefulUntil: null,
    linkCode: null,
    attachments: mail.attachments ?? null,
  })
  await enqueue(trx, messageId, now)
  return messageId
}

/**
 * Writes and queues a text that is about no notice: a code to verify a number, an answer to a reply.
 * @param text at most 160 letters of the basic alphabet.
 */
export async function queueText(
  trx: Trx,
  text: { personId: string | null; to: string; body: string; purpose: 'account' | 'reply' },
  now: Date,
): Promise<string> {
  const messageId = await insertMessage(trx, {
    personId: text.personId,
    channel: 'sms',
    address: text.to,
    subject: null,
    bodyText: text.body,
    bodyHtml: null,
    queuedAt: now,
    sendAfter: now,
    urgency: 'now',
    purpose: text.purpose,
    usefulUntil: null,
    linkCode: null,
  })
  await enqueue(trx, messageId, now)
  return messageId
}
