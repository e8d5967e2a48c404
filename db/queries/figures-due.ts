import type { Trx } from '@/db/roles'

/**
 * Systems whose kept figures are old, oldest first: older than `before`, and a day older still where nothing has
 * been heard for days and nothing will change by itself. Those never heard have none to keep.
 */
export async function figuresOlderThan(trx: Trx, before: Date, limit: number): Promise<string[]> {
  const dayBefore = new Date(before.getTime() - 86_400_000)
  const rows = await trx('system_state')
    .where((old) => void old.where('figures_at', '<', before).orWhereNull('figures_at'))
    .where(
      (worth) =>
        void worth
          .whereRaw("last_heard_at > ?::timestamptz - interval '2 days'", [before])
          .orWhereNull('figures_at')
          .orWhere('figures_at', '<', dayBefore),
    )
    .whereNotNull('head_at')
    .orderByRaw('figures_at nulls first, system_id')
    .limit(limit)
    .select<{ system_id: string }[]>('system_id')
  return rows.map((row) => String(row.system_id))
}
