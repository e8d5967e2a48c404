import type { Trx } from '@/db/roles'

export type Channel = 'email' | 'sms'
export type Urgency = 'day' | 'evening' | 'now'
export type Purpose = 'notice' | 'account' | 'reply' | 'report'

export interface Attachment {
  filename: string
  contentType: string
  base64: string
}

export interface NewMessage {
  /** Null for people without an account (an invitation). */
  personId: string | null
  channel: Channel
  address: string
  subject: string | null
  bodyText: string
  bodyHtml: string | null
  queuedAt: Date
  sendAfter: Date
  urgency: Urgency
  purpose: Purpose
  usefulUntil: Date | null
  linkCode: string | null
  attachments?: Attachment[] | null
}

export async function insertMessage(trx: Trx, message: NewMessage): Promise<string> {
  const [row] = await trx('message')
    .insert({
      person_id: message.personId,
      channel: message.channel,
      address: message.address,
      subject: message.subject,
      body_text: message.bodyText,
      body_html: message.bodyHtml,
      queued_at: message.queuedAt,
      send_after: message.sendAfter,
      urgency: message.urgency,
      purpose: message.purpose,
      useful_until: message.usefulUntil,
      link_code: message.linkCode,
      attachments: message.attachments?.length ? JSON.stringify(message.attachments) : null,
    })
    .returning<{ id: string }[]>('id')
  if (row === undefined) throw new Error('the message was not written')
  return String(row.id)
}

export async function rewriteMessage(
  trx: Trx,
  id: string,
  body: { subject: string | null; bodyText: string; bodyHtml: string | null; usefulUntil: Date | null },
): Promise<void> {
  await trx('message').where({ id }).update({
    subject: body.subject,
    body_text: body.bodyText,
    body_html: body.bodyHtml,
    useful_until: body.usefulUntil,
  })
}

/** A message to this address that still waits and may take in more; locked, so that it is not sent meanwhile. */
export async function waitingMessage(
  trx: Trx,
  to: { personId: string; channel: Channel; address: string; urgency: Urgency },
  now: Date,
): Promise<{ id: string; sendAfter: Date; linkCode: string | null } | null> {
  const row = await trx('message')
    .where({
      person_id: to.personId,
      channel: to.channel,
      address: to.address,
      urgency: to.urgency,
      purpose: 'notice',
    })
    .where('send_after', '>', now)
    .whereNull('accepted_at')
    .whereNull('failed_at')
    .whereNull('cancelled_at')
    .orderBy('id', 'desc')
    .forUpdate()
    .skipLocked()
    .first<{ id: string; send_after: Date; link_code: string | null } | undefined>(
      'id',
      'send_after',
      'link_code',
    )
  return row === undefined ? null : { id: String(row.id), sendAfter: row.send_after, linkCode: row.link_code }
}

/** Takes the events out of the messages that still wait, and those back. @returns the events. */
export async function absorbWaiting(
  trx: Trx,
  to: { personId: string; channel: Channel; address: string },
  now: Date,
): Promise<string[]> {
  const eventIds: string[] = []
  for (let waiting = await waitingMessage(trx, { ...to, urgency: 'day' }, now); waiting !== null;) {
    eventIds.push(...(await subjectsOf(trx, waiting.id)))
    await trx('message_subject').where({ message_id: waiting.id }).delete()
    await cancelMessage(trx, waiting.id, now)
    waiting = await waitingMessage(trx, { ...to, urgency: 'day' }, now)
  }
  return eventIds
}

/** @returns the events newly named: those this person was already told on this channel are left out. */
export async function insertSubjects(
  trx: Trx,
  messageId: string,
  told: { personId: string; channel: Channel; eventIds: string[] },
): Promise<string[]> {
  if (told.eventIds.length === 0) return []
  const rows = await trx('message_subject')
    .insert(
      told.eventIds.map((eventId) => ({
        message_id: messageId,
        notice_event_id: eventId,
        channel: told.channel,
        person_id: told.personId,
      })),
    )
    .onConflict()
    .ignore()
    .returning<{ notice_event_id: string }[]>('notice_event_id')
  return rows.map((row) => String(row.notice_event_id))
}

export async function subjectsOf(trx: Trx, messageId: string): Promise<string[]> {
  const rows = await trx('message_subject')
    .where({ message_id: messageId })
    .orderBy('notice_event_id')
    .select<{ notice_event_id: string }[]>('notice_event_id')
  return rows.map((row) => String(row.notice_event_id))
}

/** Who was already told which of these events, by which channel. */
export async function alreadyTold(
  trx: Trx,
  eventIds: string[],
): Promise<{ eventId: string; personId: string; channel: Channel }[]> {
  const rows = await trx('message_subject')
    .whereIn('notice_event_id', eventIds)
    .select<{ notice_event_id: string; person_id: string; channel: Channel }[]>(
      'notice_event_id',
      'person_id',
      'channel',
    )
  return rows.map((row) => ({
    eventId: String(row.notice_event_id),
    personId: String(row.person_id),
    channel: row.channel,
  }))
}

/** Everybody told of anything in these notices by a message that was not taken back. */
export async function toldOfNotices(
  trx: Trx,
  noticeIds: string[],
): Promise<{ noticeId: string; personId: string; channel: Channel }[]> {
  const rows = await trx('message_subject as s')
    .join('notice_event as e', 'e.id', 's.notice_event_id')
    .join('message as m', 'm.id', 's.message_id')
    .whereIn('e.notice_id', noticeIds)
    .whereNull('m.cancelled_at')
    .distinct<{ notice_id: string; person_id: string; channel: Channel }[]>(
      'e.notice_id',
      's.person_id',
      's.channel',
    )
  return rows.map((row) => ({
    noticeId: String(row.notice_id),
    personId: String(row.person_id),
    channel: row.channel,
  }))
}

/** Messages not yet sent that tell of these notices; locked. */
export async function unsentAbout(trx: Trx, noticeIds: string[], now: Date): Promise<string[]> {
  const { rows } = (await trx.raw(
    `select m.id from message m
     where m.accepted_at is null and m.failed_at is null and m.cancelled_at is null and m.send_after > :now
       and exists (select 1 from message_subject s join notice_event e on e.id = s.notice_event_id
         where s.message_id = m.id and e.notice_id = any (:notices::bigint[]))
     order by m.id for update skip locked`,
    { now, notices: noticeIds },
  )) as { rows: { id: string }[] }
  return rows.map((row) => String(row.id))
}

/** Takes these notices out of an unsent message. @returns the events it still tells. */
export async function dropNoticesFrom(trx: Trx, messageId: string, noticeIds: string[]): Promise<string[]> {
  await trx('message_subject')
    .where({ message_id: messageId })
    .whereIn('notice_event_id', trx('notice_event').whereIn('notice_id', noticeIds).select('id'))
    .delete()
  return subjectsOf(trx, messageId)
}

export async function cancelMessage(trx: Trx, id: string, now: Date): Promise<void> {
  await trx('message').where({ id }).update({ cancelled_at: now })
}

/** Due messages without an end, for health: how many, and how long the oldest has waited. */
export async function queueBacklog(trx: Trx, now: Date): Promise<{ backlog: number; lagSeconds: number }> {
  const row = await trx('message')
    .where('send_after', '<=', now)
    .whereNull('accepted_at')
    .whereNull('failed_at')
    .whereNull('cancelled_at')
    .first<{ count: string; oldest: Date | null }>(trx.raw('count(*) as count, min(send_after) as oldest'))
  const oldest = row.oldest
  return {
    backlog: Number(row.count),
    lagSeconds: oldest === null ? 0 : Math.max(0, (now.getTime() - oldest.getTime()) / 1000),
  }
}
