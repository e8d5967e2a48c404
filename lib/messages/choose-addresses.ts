import type { ContactAddress, Recipient } from '@/db/queries/recipients'
import type { Channel } from '@/db/queries/message-queue'
import type { Transition } from '@/db/queries/notice-events'
import type { NoticeKind } from '@/shared/schemas/words'

const OWNER_KINDS: NoticeKind[] = [
  'night-warning',
  'short-hold',
  'short-cycling',
  'running-on',
  'no-start',
  'low-supply',
  'freeze',
]
const SHOP_KINDS: NoticeKind[] = [
  'short-hold',
  'short-cycling',
  'running-on',
  'slow-recharge',
  'switch-drift',
  'step',
  'logger-silent',
  'sensor-fault',
]
/** Never by text unless asked for: what can wait for the mail. */
const BY_TEXT: Record<'owner' | 'shop', NoticeKind[]> = {
  owner: ['night-warning', 'short-cycling', 'running-on', 'no-start', 'low-supply'],
  shop: ['running-on'],
}
export const DEFAULT_NIGHT_CHANCE = 0.5

export interface Subject {
  kind: NoticeKind
  transition: Transition
  /** Of a night warning: the chance of a run even when somebody flushes last thing. */
  chanceIfFlushedLast: number | null
  /** Of a silent logger: after a day the owner hears of it, and the shop not once more. */
  audience: 'owner' | null
  /** Nobody but owners could be told: no shop looks after this vessel. */
  noShop: boolean
}

export interface ChosenAddress {
  channel: Channel
  address: string
  urgentAtNight: boolean
}

/**
 * The addresses by which somebody is told of something: at most one a channel, as they set it or, where they
 * said nothing, as is usual for owners and for a shop's people. Numbers not verified, without consent or
 * stopped are never used; without a mail address in the settings the one of the account serves.
 */
export function chooseAddresses(person: Recipient, subject: Subject): ChosenAddress[] {
  if (person.as === 'shop' && !isForShopPerson(person, subject)) return []
  if (person.as === 'owner' && subject.transition === 'escalated') return []
  return (['email', 'sms'] as const).flatMap((channel) => {
    const contact = contactsOf(person, channel).find((candidate) => wants(person, candidate, subject))
    return contact === undefined
      ? []
      : [{ channel, address: contact.address, urgentAtNight: contact.settings.urgentAtNight ?? false }]
  })
}

/** A shop's managers are told; what nobody took up goes on to those who agreed to be called at night as well. */
function isForShopPerson(person: Recipient, subject: Subject): boolean {
  if (subject.audience === 'owner') return false
  const isManager = person.roles.includes('manager')
  if (subject.transition !== 'escalated') return isManager
  if (person.onCall !== 'nobody-named') return person.onCall === 'yes'
  return isManager || person.contacts.some((contact) => contact.settings.urgentAtNight)
}

function contactsOf(person: Recipient, channel: Channel): ContactAddress[] {
  const own = person.contacts.filter((contact) => contact.channel === channel)
  if (channel === 'email' && own.length === 0) {
    return [
      {
        id: 'account',
        channel,
        address: person.email,
        verified: true,
        consented: true,
        stopped: false,
        settings: {},
      },
    ]
  }
  return own.filter(
    (contact) =>
      !contact.stopped &&
      (channel === 'email'
        ? contact.verified || contact.address.toLowerCase() === person.email.toLowerCase()
        : contact.verified && contact.consented),
  )
}

function wants(person: Recipient, contact: ContactAddress, subject: Subject): boolean {
  const { kind } = subject
  const usual = usualKinds(person, contact.channel, subject)
  if (!(contact.settings.kinds ?? usual).includes(kind)) return false
  if (kind !== 'night-warning' || subject.chanceIfFlushedLast === null) return true
  return subject.chanceIfFlushedLast > (contact.settings.nightWarningChance ?? DEFAULT_NIGHT_CHANCE)
}

function usualKinds({ as, shopKinds }: Recipient, channel: Channel, subject: Subject): NoticeKind[] {
  // What the shop does not want to hear of comes to none of its people, unless they asked for it themselves.
  if (channel === 'sms') return BY_TEXT[as].filter((kind) => shopKinds === null || shopKinds.includes(kind))
  if (as === 'shop') return shopKinds ?? SHOP_KINDS
  if (subject.noShop) return [...OWNER_KINDS, ...SHOP_KINDS]
  return subject.audience === 'owner' ? [...OWNER_KINDS, 'logger-silent'] : OWNER_KINDS
}

/** The lowest chance from which any of these people wants to be warned of a night. */
export function lowestNightChance(people: Recipient[]): number {
  const chances = people
    .filter((person) => person.as === 'owner')
    .flatMap((person) => [...contactsOf(person, 'email'), ...contactsOf(person, 'sms')])
    .map((contact) => contact.settings.nightWarningChance ?? DEFAULT_NIGHT_CHANCE)
  return chances.length === 0 ? DEFAULT_NIGHT_CHANCE : Math.min(...chances)
}
