import {
  insertAskedVisit,
  managersOf,
  noticesOfMessage,
  shopOfVessel,
  type ActableMessage,
  type ToldNotice,
} from '@/db/queries/message-acts'
import { say } from '@/db/queries/statements'
import type { Trx } from '@/db/roles'
import { env } from '@/lib/env'
import { queueMail } from '@/lib/messages/queue-mail'
import type { ActWord } from '@/lib/messages/reply-words'
import { acknowledgeNotice } from '@/lib/notices/acknowledge-notice'
import { snoozeNotice } from '@/lib/notices/snooze-notice'

/** What came of it, by name and as a sentence for the one who asked. */
export interface ActOutcome {
  did:
    | 'acknowledged'
    | 'muted'
    | 'visit-asked'
    | 'visit-stands'
    | 'said-off'
    | 'said-laid-up'
    | 'no-shop'
    | 'which-boat'
    | 'nothing-there'
  sentence: string
}

const MUTE_MS = 7 * 86_400_000

/**
 * Does what the receiver of a message asks for: acknowledge, mute, ask for a visit, say that the system is off or
 * laid up. Doing it twice does it once.
 * @param trx under the service's role: holding the message is the right to act on it.
 * @param only one of its boats, where the message tells of several.
 */
export async function actOnMessage(
  trx: Trx,
  message: ActableMessage,
  word: ActWord,
  now: Date,
  only?: { systemId: string },
): Promise<ActOutcome> {
  const told = await noticesOfMessage(trx, message)
  const notices = told.filter((notice) => only === undefined || notice.systemId === only.systemId)
  const [first] = notices
  if (first === undefined) return { did: 'nothing-there', sentence: 'There is nothing to act on any more.' }
  const boats = [...new Set(notices.map((notice) => notice.vesselName))].join(', ')
  if (word === 'OK') {
    for (const notice of notices) await acknowledgeNotice(trx, notice.noticeId, message, now)
    return { did: 'acknowledged', sentence: `Noted for ${boats}. Nobody else will be called about it.` }
  }
  if (word === 'MUTE') {
    const until = new Date(now.getTime() + MUTE_MS)
    for (const notice of notices) await snoozeNotice(trx, notice.noticeId, until, now)
    return { did: 'muted', sentence: `Nothing more about this on ${boats} for 7 days.` }
  }
  const systems = [...new Map(notices.map((notice) => [notice.systemId, notice])).values()]
  if (systems.length > 1)
    return { did: 'which-boat', sentence: 'Which boat? Open the link in the message and choose.' }
  if (word === 'VISIT') return askVisit(trx, first, message, now)
  return saySoOf(trx, first, word === 'OFF' ? 'off' : 'laid-up', message, now)
}

async function askVisit(
  trx: Trx,
  notice: ToldNotice,
  message: ActableMessage,
  now: Date,
): Promise<ActOutcome> {
  const shop = await shopOfVessel(trx, notice.vesselId)
  if (shop === null) {
    return {
      did: 'no-shop',
      sentence: `No shop looks after ${notice.vesselName} yet. Choose one under People.`,
    }
  }
  const visitId = await insertAskedVisit(trx, {
    vesselId: notice.vesselId,
    systemId: notice.systemId,
    shopId: shop.id,
    askedBy: message.personId,
    complaint: notice.reason,
    at: now,
  })
  await acknowledgeNotice(trx, notice.noticeId, message, now)
  if (visitId === null) {
    return {
      did: 'visit-stands',
      sentence: `${shop.name} has been asked for a visit to ${notice.vesselName} already.`,
    }
  }
  for (const manager of await managersOf(trx, shop.id)) {
    await queueMail(
      trx,
      {
        personId: manager.personId,
        to: manager.email,
        subject: `${notice.vesselName}: a visit is asked for`,
        paragraphs: [
          `The owner of ${notice.vesselName} asks for a visit.`,
          `What it is about: ${notice.reason}.`,
        ],
        action: { label: 'The visit', url: `${env().appUrl}/visits/${visitId}` },
        purpose: 'account',
      },
      now,
    )
  }
  return { did: 'visit-asked', sentence: `${shop.name} is asked for a visit to ${notice.vesselName}.` }
}

async function saySoOf(
  trx: Trx,
  notice: ToldNotice,
  value: 'off' | 'laid-up',
  message: ActableMessage,
  now: Date,
): Promise<ActOutcome> {
  const { vesselId, systemId, vesselName } = notice
  await say(trx, {
    vesselId,
    systemId,
    value,
    from: now,
    until: null,
    saidBy: message.personId,
    saidAt: now,
  })
  await acknowledgeNotice(trx, notice.noticeId, message, now)
  return value === 'off'
    ? { did: 'said-off', sentence: `${vesselName} is noted as switched off. Say when it is on again.` }
    : { did: 'said-laid-up', sentence: `${vesselName} is noted as laid up. Notices pause until you end it.` }
}
