import type { Trx } from '@/db/roles'

/** Systems whose moving was last judged before an instant and that were heard since, longest ago first. */
export async function movingOlderThan(trx: Trx, before: Date, limit: number): Promise<string[]> {
  const rows = await trx('system_state')
    .whereNotNull('head_at')
    .where((old) =>
      old
        .whereNull('moving_at')
        .orWhere((both) => both.where('moving_at', '<', before).whereRaw('last_heard_at > moving_at')),
    )
    .orderByRaw('moving_at nulls first, system_id')
    .limit(limit)
    .select<{ system_id: string }[]>('system_id')
  return rows.map((row) => row.system_id)
}

/** When the last visit whose repair held was finished, from an instant on, epoch milliseconds; null = none. */
export async function repairedAt(trx: Trx, systemId: string, since: Date): Promise<number | null> {
  const { rows } = await trx.raw<{ rows: { at: number | null }[] }>(
    `select (extract(epoch from max(v.finished_at)) * 1000)::float8 as at from visit v join system s on s.id = ?
     where v.vessel_id = s.vessel_id and (v.system_id is null or v.system_id = s.id)
       and v.verdict = 'held' and v.finished_at >= ?`,
    [systemId, since],
  )
  return rows[0]?.at ?? null
}

export async function writeMoving(trx: Trx, systemId: string, moving: unknown, at: Date): Promise<void> {
  await trx('system_state')
    .where({ system_id: systemId })
    .update({ moving: moving === null ? null : JSON.stringify(moving), moving_at: at })
}
