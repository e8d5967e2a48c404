import type { Trx } from '@/db/roles'

/** Systems whose kept figures are older than an instant, oldest first; those never heard have none to keep. */
export async function figuresOlderThan(trx: Trx, before: Date, limit: number): Promise<string[]> {
  const rows = await trx('system_state')
    .where((old) => void old.where('figures_at', '<', before).orWhereNull('figures_at'))
    .whereNotNull('head_at')
    .orderByRaw('figures_at nulls first, system_id')
    .limit(limit)
    .select<{ system_id: string }[]>('system_id')
  return rows.map((row) => String(row.system_id))
}
