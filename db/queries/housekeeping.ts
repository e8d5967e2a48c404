import type { Trx } from '@/db/roles'
import type { NoticeKind } from '@/shared/schemas/words'

/** Creates and attaches the months from this one to `ahead` later ones. @returns how many were new. */
export async function attachMonths(trx: Trx, now: Date, ahead: number): Promise<number> {
  const { rows } = (await trx.raw(
    "select sample_partitions((?::timestamptz at time zone 'UTC')::date, ((?::timestamptz at time zone 'UTC') + make_interval(months => ?::int))::date) as made",
    [now, now, ahead],
  )) as { rows: { made: number }[] }
  return rows[0]?.made ?? 0
}

/** Ends notices of a kind that were opened before an instant. @returns how many. */
export async function expireNotices(
  trx: Trx,
  kind: NoticeKind,
  openedBefore: Date,
  now: Date,
): Promise<number> {
  const { rows } = (await trx.raw(
    `with old as (
       update notice set closed_at = :now, held_since = null
       where kind = :kind and closed_at is null and opened_at < :before returning id)
     insert into notice_event (notice_id, at, transition, reason)
     select id, :now, 'ended', 'It has stood long enough to be no news' from old
     on conflict do nothing returning id`,
    { kind, before: openedBefore, now },
  )) as { rows: unknown[] }
  return rows.length
}

/** Deletes sessions, secrets and claims that ran out before an instant. @returns how many rows. */
export async function clearExpired(trx: Trx, before: Date): Promise<number> {
  const sessions = await trx('session')
    .where('expires_at', '<', before)
    .orWhere('ended_at', '<', before)
    .delete()
  const tokens = await trx('token').where('expires_at', '<', before).delete()
  const claims = await trx('device_claim').where('expires_at', '<', before).delete()
  return sessions + tokens + claims
}
