import { randomInt } from 'node:crypto'
import type { Trx } from '@/db/roles'
import {
  absorbWaiting,
  alreadyTold,
  cancelMessage,
  dropNoticesFrom,
  insertMessage,
  insertSubjects,
  rewriteMessage,
  subjectsOf,
  toldOfNotices,
  unsentAbout,
  waitingMessage,
  type Channel,
  type Urgency,
} from '@/db/queries/message-queue'
import { messagePerson, quietUntil, recipientsOf, type Recipient } from '@/db/queries/recipients'
import { toldEvents, type ToldEvent } from '@/db/queries/notice-events'
import { toldOfNight } from '@/db/queries/told'
import { nightWindows } from '@/db/queries/zones'
import { chooseAddresses, type ChosenAddress, type Subject } from '@/lib/messages/choose-addresses'
import { env } from '@/lib/env'
import { compose } from '@/lib/messages/compose'
import { nightEvidenceSchema } from '@/lib/messages/evidence'
import { enqueue } from '@/lib/messages/queue'

/** News that can wait a moment is gathered, so that two findings of one upload are one message. */
const GATHER_MS = 60_000
/** In the evening it waits for what is said of the night, to be told together with it. */
const EVENING_GATHER_MS = 5 * 60_000
const EVENING_BEFORE_MS = 2 * 3_600_000 + EVENING_GATHER_MS
const EVENING_AFTER_MS = 3_600_000
/** What a night warning has said already, to those it was sent to. */
const SAID_BY_NIGHT = ['short-hold', 'short-cycling']
const LINK_ALPHABET = '23456789abcdefghjkmnpqrstuvwxyz'
const LINK_LENGTH = 10

interface Addressed {
  person: Recipient
  chosen: ChosenAddress
  urgency: Urgency
  events: ToldEvent[]
}

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
  const addressed = await address(trx, events)
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

async function address(trx: Trx, events: ToldEvent[]): Promise<Addressed[]> {
  const told = await alreadyTold(
    trx,
    events.map((event) => event.eventId),
  )
  const toldBefore = await toldOfNotices(
    trx,
    events.map((event) => event.noticeId),
  )
  const night = await toldOfNight(
    trx,
    events.map((event) => event.systemId),
  )
  const groups = new Map<string, Addressed>()
  for (const event of events) {
    const people = onePerPerson(await recipientsOf(trx, event.vesselId), subjectOf(event, false))
    const subject = subjectOf(event, !people.some((person) => person.as === 'shop'))
    for (const person of people) {
      for (const chosen of chooseAddresses(person, subject)) {
        const same = (entry: { personId: string; channel: string }) =>
          entry.personId === person.personId && entry.channel === chosen.channel
        if (told.some((entry) => entry.eventId === event.eventId && same(entry))) continue
        // An end is news only to those who heard of the beginning.
        if (
          event.transition === 'ended' &&
          !toldBefore.some((entry) => entry.noticeId === event.noticeId && same(entry))
        )
          continue
        if (
          SAID_BY_NIGHT.includes(event.kind) &&
          event.transition === 'opened' &&
          night.some((entry) => entry.systemId === event.systemId && same(entry))
        )
          continue
        const urgency = urgencyOf(event)
        const key = [person.personId, chosen.channel, chosen.address, urgency].join('\n')
        const group = groups.get(key) ?? { person, chosen, urgency, events: [] }
        group.events.push(event)
        groups.set(key, group)
      }
    }
  }
  return [...groups.values()]
}

/** Somebody who owns the boat and works in its shop is told once, in the standing by which they are told more. */
function onePerPerson(people: Recipient[], subject: Subject): Recipient[] {
  const kept = new Map<string, Recipient>()
  for (const person of people) {
    const before = kept.get(person.personId)
    const more =
      before !== undefined &&
      chooseAddresses(person, subject).length > chooseAddresses(before, subject).length
    if (before === undefined || more) kept.set(person.personId, person)
  }
  return [...kept.values()]
}

function subjectOf(event: ToldEvent, noShop: boolean): Subject {
  const chance = event.evidence.chanceIfFlushedLast
  return {
    kind: event.kind,
    transition: event.transition,
    chanceIfFlushedLast: typeof chance === 'number' ? chance : null,
    audience: event.evidence.audience === 'owner' ? 'owner' : null,
    noShop,
  }
}

function urgencyOf(event: ToldEvent): Urgency {
  if (event.transition === 'ended') return 'day'
  if (event.kind === 'night-warning') return 'evening'
  return event.kind === 'running-on' ? 'now' : 'day'
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
  const sendAfter = await sendAfterFor(trx, one, now)
  const messageId = await insertMessage(trx, {
    ...to,
    ...body,
    queuedAt: now,
    sendAfter,
    purpose: 'notice',
    usefulUntil: usefulUntil(events),
    linkCode,
  })
  await insertSubjects(trx, messageId, { ...to, eventIds })
  await enqueue(trx, messageId, sendAfter)
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

async function sendAfterFor(trx: Trx, one: Addressed, now: Date): Promise<Date> {
  if (one.urgency === 'evening') return now
  if (one.urgency === 'now' && one.chosen.urgentAtNight) return now
  const quietEnd = await quietUntil(trx, one.person.quiet, now)
  if (quietEnd !== null) return quietEnd
  if (one.urgency === 'now') return now
  const gatherMs = (await isEvening(trx, one, now)) ? EVENING_GATHER_MS : GATHER_MS
  return new Date(now.getTime() + gatherMs)
}

/** Is one of these boats about to be, or just being, told what its night will bring? */
async function isEvening(trx: Trx, one: Addressed, now: Date): Promise<boolean> {
  const windows = await nightWindows(trx, [...new Set(one.events.map((event) => event.vesselId))], now)
  return windows.some(
    ({ from }) =>
      now.getTime() >= from.getTime() - EVENING_BEFORE_MS &&
      now.getTime() < from.getTime() + EVENING_AFTER_MS,
  )
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
