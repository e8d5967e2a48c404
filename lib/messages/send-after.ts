import { quietUntil } from '@/db/queries/recipients'
import { nightWindows } from '@/db/queries/zones'
import type { Trx } from '@/db/roles'
import type { Addressed } from '@/lib/messages/address-events'

/** News that can wait a moment is gathered, so that two findings of one upload are one message. */
const GATHER_MS = 60_000
/** In the evening it waits for what is said of the night, to be told together with it. */
const EVENING_GATHER_MS = 5 * 60_000
const EVENING_BEFORE_MS = 2 * 3_600_000 + EVENING_GATHER_MS
const EVENING_AFTER_MS = 3_600_000

/**
 * The instant before which a message does not leave: at once in the evening and when urgent, after the receiver's
 * quiet hours otherwise.
 */
export async function sendAfter(trx: Trx, one: Addressed, now: Date): Promise<Date> {
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
