import { render } from '@react-email/render'
import type { Channel } from '@/db/queries/message-queue'
import type { ToldEvent } from '@/db/queries/notice-events'
import type { Units } from '@/shared/schemas/people'
import { NoticeEmail, type BoatWords } from '@/lib/messages/emails/notice-email'
import { stripText } from '@/lib/messages/emails/night-strip'
import { firstThatFits, shorten, toGsm } from '@/lib/messages/gsm'
import { wordingOf } from '@/lib/messages/wording'

export interface Body {
  subject: string | null
  bodyText: string
  bodyHtml: string | null
}

export interface Reader {
  name: string
  units: Units
}

/** Addresses that a message points to, from where the pages are served. */
export interface Places {
  appUrl: string
  linkCode: string
}

/**
 * Writes one message about one event or several, for one reader.
 * @param events in the order in which they are told; at least one.
 */
export async function compose(
  channel: Channel,
  events: ToldEvent[],
  reader: Reader,
  places: Places,
): Promise<Body> {
  // The night first: what is to be done this evening stands before what can wait.
  const inOrder = [...events].sort((a, b) => rankOf(a) - rankOf(b))
  const boats = inOrder.map((event) => boatWords(event, reader.units, places))
  if (channel === 'sms') return { subject: null, bodyText: textMessage(boats, places), bodyHtml: null }
  const actUrl = `${places.appUrl}/a/${places.linkCode}`
  const greeting = `For ${reader.name}`
  return {
    subject: subjectOf(boats),
    bodyText: plainMail(boats, greeting, actUrl),
    bodyHtml: await render(
      <NoticeEmail
        boats={boats}
        actUrl={actUrl}
        settingsUrl={`${places.appUrl}/account`}
        greeting={greeting}
      />,
    ),
  }
}

const rankOf = (event: ToldEvent): number => (event.kind === 'night-warning' ? 0 : 1)

/** The first of what there is to say of each boat. */
const onePerBoat = (boats: BoatWords[]): BoatWords[] =>
  boats.filter((boat, index) => boats.findIndex((other) => other.boat === boat.boat) === index)

function boatWords(event: ToldEvent, units: Units, places: Places): BoatWords {
  return {
    boat: event.systemName === '' ? event.vesselName : `${event.vesselName}, ${event.systemName}`,
    url: `${places.appUrl}/vessels/${event.vesselId}`,
    wording: wordingOf(event, units),
  }
}

function subjectOf(boats: BoatWords[]): string {
  const [first] = boats
  if (first === undefined) return ''
  const names = [...new Set(boats.map((boat) => boat.boat))]
  if (names.length === 1 && first.wording.strip !== null) return `${first.boat}: ${first.wording.subject}`
  if (names.length === 1) return `${first.boat}: ${boats.map((boat) => boat.wording.subject).join('; ')}`
  const nights = boats.filter((boat) => boat.wording.strip !== null).map((boat) => boat.boat)
  return nights.length > 0
    ? `The toilet pump is likely to run tonight on ${listed(nights)}`
    : `News of ${listed(names)}`
}

const listed = (names: string[]): string =>
  names.length <= 3
    ? names.join(' and ').replace(/ and (?=.* and )/g, ', ')
    : `${names.slice(0, 2).join(', ')} and ${names.length - 2} more`

function plainMail(boats: BoatWords[], greeting: string, actUrl: string): string {
  const parts = boats.map(({ boat, url, wording }) =>
    [
      `${boat}\n${wording.finding}`,
      wording.strip === null ? null : stripText(wording.strip),
      wording.sureness,
      wording.steps.map((step, index) => `${index + 1}. ${step}`).join('\n'),
      wording.caution,
      `Its record: ${url}`,
    ]
      .filter((part) => part !== null && part !== '')
      .join('\n\n'),
  )
  return [
    greeting,
    ...parts,
    `Acknowledge, mute, or ask for a visit: ${actUrl}`,
    'Middlewatch measures; it does not certify, and is no substitute for a bilge or gas alarm. Times are the boat’s own.',
  ].join('\n\n')
}

/** Boat, what, what to do, where to look, within one text of 160 letters of the basic alphabet. */
function textMessage(told: BoatWords[], places: Places): string {
  const boats = onePerBoat(told)
  const link = `${places.appUrl.replace(/^https:\/\//, '')}/a/${places.linkCode}`
  const [first, ...others] = boats
  if (first === undefined) return ''
  if (others.length === 0) {
    const names = [first.boat, shorten(toGsm(first.boat), 24), shorten(toGsm(first.boat), 14)]
    const wordings = names.flatMap((name) => first.wording.texts.map((text) => `${name}: ${text} ${link}`))
    const bare = first.wording.short
    return firstThatFits([...wordings, `${names[2]}: ${bare}. ${link}`])
  }
  const tonight = boats.every((boat) => boat.wording.strip !== null)
  const head = tonight ? 'Pump likely to run tonight: ' : ''
  const tail = tonight ? ' Last flush, let it stop, then a cup of water in each bowl.' : ''
  const list = (count: number, nameLength: number) => {
    const named = boats
      .slice(0, count)
      .map((boat) => `${shorten(toGsm(boat.boat), nameLength)} ${boat.wording.short}`)
    const rest = boats.length - count
    return rest > 0 ? `${named.join(', ')} and ${rest} more` : named.join(', ')
  }
  const counts = boats.map((_, index) => boats.length - index)
  return firstThatFits([
    `${head}${list(boats.length, 40)}.${tail} ${link}`,
    ...counts.flatMap((count) => [
      `${head}${list(count, 14)}.${tail} ${link}`,
      `${head}${list(count, 14)}. ${link}`,
    ]),
    `${boats.length} boats have news: ${link}`,
  ])
}
