import type { Trx } from '@/db/roles'
import type { StatementValue } from '@/shared/schemas/words'

export interface SaidOfSystem {
  value: StatementValue
  from: Date
}

/** What people say of a system, in force at an instant; said last, it stands. */
export async function statementInForce(trx: Trx, systemId: string, at: Date): Promise<SaidOfSystem | null> {
  const row = await trx('statement')
    .where({ system_id: systemId })
    .where('from_at', '<=', at)
    .andWhere((open) => void open.whereNull('until_at').orWhere('until_at', '>', at))
    .orderBy('from_at', 'desc')
    .orderBy('id', 'desc')
    .first<{ value: StatementValue; from_at: Date } | undefined>('value', 'from_at')
  return row === undefined ? null : { value: row.value, from: row.from_at }
}

/** The vessel a system is on; null when there is no such system. */
export async function vesselOfSystem(
  trx: Trx,
  systemId: string,
): Promise<{ vesselId: string; timeZone: string } | null> {
  const row = await trx('system as s')
    .join('vessel as v', 'v.id', 's.vessel_id')
    .where('s.id', systemId)
    .first<{ vessel_id: string; time_zone: string } | undefined>('s.vessel_id', 'v.time_zone')
  return row === undefined ? null : { vesselId: String(row.vessel_id), timeZone: row.time_zone }
}
