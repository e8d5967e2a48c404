import { addEvent, setAcknowledged, setSnoozed } from '@/db/queries/notice-writes'
import type { NoticeRow } from '@/db/queries/notices'
import type { Trx } from '@/db/roles'
import { checkedWrite } from '@/lib/access/checked-write'
import { requireRight } from '@/lib/access/require-right'
import type { Who } from '@/lib/auth/who'
import type { Notice } from '@/shared/schemas'
import { noticeOnWire, requireNotice } from './read-notices'

const check =
  (noticeId: string) =>
  async (trx: Trx): Promise<NoticeRow> => {
    const notice = await requireNotice(trx, noticeId)
    await requireRight(trx, notice.vesselId, 'acknowledge')
    return notice
  }

/** The first to acknowledge counts; a later note replaces the one before. @throws Problem `not-found`, `not-allowed` */
export async function acknowledgeNotice(
  who: Who,
  noticeId: string,
  note: string | undefined,
  now: Date,
): Promise<Notice> {
  return checkedWrite(who.personId, check(noticeId), async (trx, before) => {
    await setAcknowledged(trx, noticeId, who.personId, now, note ?? null)
    if (before.acknowledgedAt === null || note !== undefined)
      await addEvent(trx, noticeId, 'acknowledged', {
        at: now,
        reason: note ? `${who.name}: ${note}` : `acknowledged by ${who.name}`,
      })
    return noticeOnWire(await requireNotice(trx, noticeId))
  })
}

/** Quiets a notice until an instant; null wakes it again. */
export async function snoozeNotice(
  who: Who,
  noticeId: string,
  snoozedUntil: string | null,
  now: Date,
): Promise<Notice> {
  const until = snoozedUntil === null ? null : new Date(snoozedUntil)
  return checkedWrite(who.personId, check(noticeId), async (trx) => {
    await setSnoozed(trx, noticeId, until)
    if (until !== null)
      await addEvent(trx, noticeId, 'snoozed', {
        at: now,
        reason: `snoozed by ${who.name} until ${until.toISOString()}`,
      })
    return noticeOnWire(await requireNotice(trx, noticeId))
  })
}
