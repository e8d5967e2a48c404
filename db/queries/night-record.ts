import type { Trx } from '@/db/roles'
import type { OpenNotice } from '@/db/queries/notice-writes'

/** Night warnings that still stand and whose night is over. */
export async function endedNightWarnings(
  trx: Trx,
  now: Date,
): Promise<Pick<OpenNotice, 'id' | 'systemId'>[]> {
  const rows = await trx('notice')
    .where({ kind: 'night-warning' })
    .whereNull('closed_at')
    .whereRaw("(evidence->'quiet'->>'to')::timestamptz <= ?", [now])
    .orderBy('id')
    .select<{ id: string; system_id: string }[]>('id', 'system_id')
  return rows.map((row) => ({ id: String(row.id), systemId: String(row.system_id) }))
}

/** The newest sample of a system, whatever the clock said when it came; the beginning of time when there is none. */
export async function newestSampleAt(trx: Trx, systemId: string): Promise<Date> {
  const row = await trx('system_state')
    .where({ system_id: systemId })
    .first<{ head_at: Date | null } | undefined>('head_at')
  return row?.head_at ?? new Date(0)
}
