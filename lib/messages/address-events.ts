import { alreadyTold, toldOfNotices, type Urgency } from '@/db/queries/message-queue'
import type { ToldEvent } from '@/db/queries/notice-events'
import { recipientsOf, type Recipient } from '@/db/queries/recipients'
import { toldOfNight } from '@/db/queries/told'
import type { Trx } from '@/db/roles'
import { chooseAddresses, type ChosenAddress, type Subject } from '@/lib/messages/choose-addresses'

/** What a night warning has said already, to those it was sent to. */
const SAID_BY_NIGHT = ['short-hold', 'short-cycling']

export interface Addressed {
  person: Recipient
  chosen: ChosenAddress
  urgency: Urgency
  events: ToldEvent[]
}

/**
 * Who is told of these events, by which address and how soon: one entry a person, channel and urgency, with all
 * that it tells. Left out is what somebody was told already.
 */
export async function addressEvents(trx: Trx, events: ToldEvent[]): Promise<Addressed[]> {
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
    const everybody = await recipientsOf(trx, event.vesselId)
    const subject = subjectOf(event, !everybody.some((person) => person.as === 'shop'))
    const people = onePerPerson(everybody, subject)
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
