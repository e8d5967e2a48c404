import type { Trx } from '@/db/roles'
import type { Attachment, Channel, Purpose } from '@/db/queries/message-queue'

/** What sending needs. */
export interface OutgoingMessage {
  id: string
  personId: string | null
  channel: Channel
  address: string
  subject: string | null
  bodyText: string
  bodyHtml: string | null
  purpose: Purpose
  sendAfter: Date
  usefulUntil: Date | null
  acceptedAt: Date | null
  failedAt: Date | null
  cancelledAt: Date | null
  attachments: Attachment[]
}

interface OutgoingRow {
  id: string
  person_id: string | null
  channel: Channel
  address: string
  subject: string | null
  body_text: string
  body_html: string | null
  purpose: Purpose
  send_after: Date
  useful_until: Date | null
  accepted_at: Date | null
  failed_at: Date | null
  cancelled_at: Date | null
  attachments: Attachment[] | null
}

/** The message, locked for as long as it is being sent; null when another worker holds it or it is gone. */
export async function lockMessage(trx: Trx, id: string): Promise<OutgoingMessage | null> {
  // Receipts that come meanwhile refer to this row and must not wait for it.
  const row = await trx('message')
    .where({ id })
    .forNoKeyUpdate()
    .skipLocked()
    .first<OutgoingRow | undefined>()
  if (row === undefined) return null
  return {
    id: String(row.id),
    personId: row.person_id === null ? null : String(row.person_id),
    channel: row.channel,
    address: row.address,
    subject: row.subject,
    bodyText: row.body_text,
    bodyHtml: row.body_html,
    purpose: row.purpose,
    sendAfter: row.send_after,
    usefulUntil: row.useful_until,
    acceptedAt: row.accepted_at,
    failedAt: row.failed_at,
    cancelledAt: row.cancelled_at,
    attachments: row.attachments ?? [],
  }
}

export type AttemptOutcome = 'accepted' | 'refused' | 'failed' | 'delivered' | 'undelivered'

export async function noteAttempt(
  trx: Trx,
  messageId: string,
  at: Date,
  outcome: AttemptOutcome,
  detail: string | null,
): Promise<void> {
  await trx('delivery_attempt').insert({ message_id: messageId, at, outcome, detail })
}

/** A receipt from the service that it has this message, however the sending ended on our side. */
export async function receiptOf(trx: Trx, messageId: string): Promise<{ at: Date } | null> {
  const row = await trx('delivery_attempt')
    .where({ message_id: messageId })
    .whereIn('outcome', ['accepted', 'delivered', 'undelivered'])
    .orderBy('id')
    .first<{ at: Date } | undefined>('at')
  return row ?? null
}

export async function setAccepted(trx: Trx, id: string, at: Date, serviceId: string | null): Promise<void> {
  await trx('message')
    .where({ id })
    .whereNull('accepted_at')
    .update({ accepted_at: at, failed_at: null, failure: null, service_id: serviceId })
}

/** Empties what was written in a message; that it was sent, to whom and about what stays. */
export async function forgetBody(trx: Trx, id: string): Promise<void> {
  await trx('message').where({ id }).update({ body_text: '', body_html: null })
}

export async function setDelivered(trx: Trx, id: string, at: Date): Promise<void> {
  await trx('message').where({ id }).whereNull('delivered_at').update({ delivered_at: at })
}

export async function setFailed(trx: Trx, id: string, at: Date, failure: string): Promise<void> {
  await trx('message').where({ id }).update({ failed_at: at, failure })
}

/** Makes a given-up message sendable again. @returns false when it was sent, waits, or is not there. */
export async function reviveMessage(trx: Trx, id: string, now: Date): Promise<boolean> {
  const count = await trx('message')
    .where({ id })
    .whereNotNull('failed_at')
    .whereNull('cancelled_at')
    .update({ failed_at: null, failure: null, accepted_at: null, useful_until: null, send_after: now })
  return count > 0
}

export async function messageExists(trx: Trx, id: string): Promise<boolean> {
  return (await trx('message').where({ id }).first('id')) !== undefined
}
