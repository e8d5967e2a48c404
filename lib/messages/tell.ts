import { randomInt } from 'node:crypto'
import type { Trx } from '@/db/roles'
import {
  absorbWaiting,
  cancelMessage,
  dropNoticesFrom,
  insertMessage,
  insertSubjects,
  rewriteMessage,
  subjectsOf,
  unsentAbout,
  waitingMessage,
} from '@/db/queries/message-queue'
import { toldEvents, type ToldEvent } from '@/db/queries/notice-events'
import { messagePerson } from '@/db/queries/recipients'
import { env } from '@/lib/env'
import { addressEvents, type Addressed } from '@/lib/messages/address-events'
import { compose } from '@/lib/messages/compose'
import { nightEvidenceSchema } from '@/lib/messages/evidence'
import { enqueue } from '@/lib/messages/queue'
import { sendAfter } from '@/lib/messages/send-after'

const LINK_ALPHABET = '23456789abcdefghjkmnpqrstuvwxyz'
const LINK_LENGTH = 10

/**
 * Writes and queues the messages that these events call for, in the caller's transaction: who is told, by
 * which channel, when, and together with what. Telling the same events again does nothing.
 * @param eventIds events of notices, of any number of boats: one person gets one message about all of them.
 * @returns ids of the messages written or added to.
 */
export async function tell(trx: Trx, eventIds: string[], now: Date): Promise<string[]> {
  const events = await toldEvents(trx, eventIds)
  const ended = events.filter((event) => event.transition === 'ended')
  if (ended.length > 0) await takeBackUnsent(trx, ended, now)
  const addressed = await addressEvents(trx, events)
  const messageIds: string[] = []
  for (const one of addressed) messageIds.push(await send(trx, one, now))
  return messageIds
}

/** An opening that nobody has read yet and an end are no news at all. */
async function takeBackUnsent(trx: Trx, ended: ToldEvent[], now: Date): Promise<void> {
  const noticeIds = ended.map((event) => event.noticeId)
  for (const messageId of await unsentAbout(trx, noticeIds, now)) {
    const left = await dropNoticesFrom(trx, messageId, noticeIds)
    if (left.length === 0) await cancelMessage(trx, messageId, now)
    else await rewrite(trx, messageId)
  }
}

async function send(trx: Trx, one: Addressed, now: Date): Promise<string> {
  const { person, chosen, urgency } = one
  const to = { personId: person.personId, channel: chosen.channel, address: chosen.address, urgency }
  const absorbed = urgency === 'evening' ? await absorbWaiting(trx, to, now) : []
  const eventIds = [...one.events.map((event) => event.eventId), ...absorbed]
  const events = absorbed.length === 0 ? one.events : await toldEvents(trx, eventIds)
  const waiting = await waitingMessage(trx, to, now)
  if (waiting !== null) {
    await insertSubjects(trx, waiting.id, { ...to, eventIds })
    await rewrite(trx, waiting.id)
    return waiting.id
  }
  const linkCode = newLinkCode()
  const body = await compose(chosen.channel, events, person, { appUrl: env().appUrl, linkCode })
  const after = await sendAfter(trx, one, now)
  const messageId = await insertMessage(trx, {
    ...to,
    ...body,
    queuedAt: now,
    sendAfter: after,
    purpose: 'notice',
    usefulUntil: usefulUntil(events),
    linkCode,
  })
  await insertSubjects(trx, messageId, { ...to, eventIds })
  await enqueue(trx, messageId, after)
  return messageId
}

/** Writes a message that still waits anew, from all that it now tells. */
async function rewrite(trx: Trx, messageId: string): Promise<void> {
  const events = await toldEvents(trx, await subjectsOf(trx, messageId))
  const reader = await messagePerson(trx, messageId)
  if (reader === null) return
  const body = await compose(reader.channel, events, reader, {
    appUrl: env().appUrl,
    linkCode: reader.linkCode,
  })
  await rewriteMessage(trx, messageId, { ...body, usefulUntil: usefulUntil(events) })
}

/** A night warning is of use until its night is over, whatever else is told with it; other news keeps. */
function usefulUntil(events: ToldEvent[]): Date | null {
  const ends = events.flatMap((event) => {
    const night = nightEvidenceSchema.pick({ quiet: true }).safeParse(event.evidence)
    return event.kind === 'night-warning' && night.success ? [Date.parse(night.data.quiet.to)] : []
  })
  return ends.length === 0 ? null : new Date(Math.max(...ends))
}

/** About 49 bits: a link in a message acts without a password, so it must not be guessed. */
export const newLinkCode = (): string =>
  Array.from({ length: LINK_LENGTH }, () => LINK_ALPHABET.charAt(randomInt(LINK_ALPHABET.length))).join('')
