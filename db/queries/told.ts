import type { Trx } from '@/db/roles'

/** Was an event of this notice meant for the owner alone already? */
export async function ownersToldOf(trx: Trx, noticeId: string): Promise<boolean> {
  const row = await trx('notice_event')
    .where({ notice_id: noticeId })
    .whereRaw("evidence->>'audience' = 'owner'")
    .first('id')
  return row !== undefined
}

/** Who was told of a night warning that still stands on these systems, by which channel. */
export async function toldOfNight(
  trx: Trx,
  systemIds: string[],
): Promise<{ systemId: string; personId: string; channel: string }[]> {
  const rows = await trx('notice as n')
    .join('notice_event as e', 'e.notice_id', 'n.id')
    .join('message_subject as s', 's.notice_event_id', 'e.id')
    .where('n.kind', 'night-warning')
    .whereNull('n.closed_at')
    .whereIn('n.system_id', systemIds)
    .distinct<{ system_id: string; person_id: string; channel: string }[]>(
      'n.system_id',
      's.person_id',
      's.channel',
    )
  return rows.map((row) => ({
    systemId: String(row.system_id),
    personId: String(row.person_id),
    channel: row.channel,
  }))
}
