import { addEvent, setSnoozed } from '@/db/queries/notice-writes'
import type { Trx } from '@/db/roles'

/**
 * Nothing more of this kind on this system until an instant; null wakes it again. It goes on being judged, and
 * ends when it is over.
 * @param trx under the person's own role, or the service's for a reply to a message.
 * @returns false when there is no such notice for this role.
 */
export async function snoozeNotice(
  trx: Trx,
  noticeId: string,
  until: Date | null,
  now: Date,
): Promise<boolean> {
  if (!(await setSnoozed(trx, noticeId, until))) return false
  const reason = until === null ? 'Awake again' : `Snoozed until ${until.toISOString()}`
  await addEvent(trx, noticeId, 'snoozed', {
    at: now,
    reason,
    evidence: { until: until?.toISOString() ?? null },
  })
  return true
}
