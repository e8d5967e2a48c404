import type { Trx } from '@/db/roles'
import { addEvent } from '@/db/queries/notice-writes'
import { unansweredUrgent } from '@/db/queries/escalations'
import { tell } from '@/lib/messages/tell'
import type { Tick } from '@/lib/ticks/run-tick'

/** So long somebody has to say that they know. */
const ANSWER_WITHIN_MS = 30 * 60_000

/** Passes urgent notices that nobody took up on to the people whom a shop may call at any hour. */
export const escalationTick: Tick = { name: 'escalation', role: 'service', work: passOn }

export async function passOn(trx: Trx, now: Date): Promise<Record<string, number>> {
  const unanswered = await unansweredUrgent(trx, new Date(now.getTime() - ANSWER_WITHIN_MS))
  const eventIds: string[] = []
  for (const notice of unanswered) {
    eventIds.push(
      await addEvent(trx, notice.id, 'escalated', {
        at: now,
        reason: 'Nobody has acknowledged it within half an hour',
        evidence: notice.evidence,
      }),
    )
  }
  await tell(trx, eventIds, now)
  return { escalated: eventIds.length }
}
