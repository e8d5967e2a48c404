import { addEvent, setAcknowledged } from '@/db/queries/notice-writes'
import type { Trx } from '@/db/roles'

/**
 * Somebody says that they know: what is urgent goes to nobody else then.
 * @param trx under the person's own role, or the service's for a link in a message.
 * @param by who; null for a link that several people may hold.
 * @returns false when there is no such notice for this role.
 */
export async function acknowledgeNotice(
  trx: Trx,
  noticeId: string,
  by: { personId: string | null; note?: string | null },
  now: Date,
): Promise<boolean> {
  const note = by.note ?? null
  if (!(await setAcknowledged(trx, noticeId, by.personId, now, note))) return false
  await addEvent(trx, noticeId, 'acknowledged', { at: now, reason: note ?? 'Acknowledged' })
  return true
}
