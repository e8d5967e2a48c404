import type { Trx } from '@/db/roles'

/** Systems of which a leg became known since an instant. */
export async function systemsWithNewLegs(trx: Trx, since: Date): Promise<string[]> {
  const rows = await trx('leg')
    .where('known_at', '>=', since)
    .distinct<{ system_id: string }[]>('system_id')
    .orderBy('system_id')
  return rows.map((row) => String(row.system_id))
}
