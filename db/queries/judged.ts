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

/** The set-up's figures that notices are judged by, in force at an instant; defaults where nothing was set. */
export async function judgedSettings(
  trx: Trx,
  systemId: string,
  at: Date,
): Promise<{
  limitSeconds: number
  cutOutPa: number | null
  cutInPa: number | null
  lowSupplyV: number | null
}> {
  const row = await trx('setting')
    .where({ system_id: systemId })
    .where('in_force_from', '<=', at)
    .orderBy('in_force_from', 'desc')
    .first<
      | {
          limit_seconds: number
          cut_out_pa: number | null
          cut_in_pa: number | null
          low_supply_v: number | null
        }
      | undefined
    >('limit_seconds', 'cut_out_pa', 'cut_in_pa', 'low_supply_v')
  return {
    limitSeconds: row?.limit_seconds ?? 10_800,
    cutOutPa: row?.cut_out_pa ?? null,
    cutInPa: row?.cut_in_pa ?? null,
    lowSupplyV: row?.low_supply_v ?? null,
  }
}

/** Sensor faults known at `at` that lasted beyond `since`, oldest first; times epoch milliseconds. */
export async function faultsKnown(
  trx: Trx,
  systemId: string,
  since: Date,
  at: Date,
): Promise<{ kind: string; startedAt: number; endedAt: number; detail: string }[]> {
  const rows = await trx('fault')
    .where({ system_id: systemId })
    .where('ended_at', '>=', since)
    .where('known_at', '<=', at)
    .orderBy('ended_at')
    .select<{ kind: string; started_at: Date; ended_at: Date; detail: string }[]>()
  return rows.map((row) => ({
    kind: row.kind,
    startedAt: row.started_at.getTime(),
    endedAt: row.ended_at.getTime(),
    detail: row.detail,
  }))
}

/** The supply while the pump was off in the last half hour, and the newest air of the last hour. */
export async function recentConditions(
  trx: Trx,
  systemId: string,
  now: Date,
): Promise<{
  supply: { lowestV: number; highestV: number; count: number } | null
  air: { at: number; airC: number } | null
}> {
  const { rows } = (await trx.raw(
    `with recent as (select * from system_samples(:system, :now::timestamptz - interval '1 hour', :now::timestamptz + interval '1 second'))
     select min(supply_v) filter (where pump_on is not true and at > :now::timestamptz - interval '30 minutes') as lowest,
       max(supply_v) filter (where pump_on is not true and at > :now::timestamptz - interval '30 minutes') as highest,
       count(supply_v) filter (where pump_on is not true and at > :now::timestamptz - interval '30 minutes')::int as count,
       (select air_c from recent where air_c is not null order by at desc limit 1) as air,
       (select at from recent where air_c is not null order by at desc limit 1) as air_at
     from recent`,
    { system: systemId, now },
  )) as {
    rows: {
      lowest: number | null
      highest: number | null
      count: number
      air: number | null
      air_at: Date | null
    }[]
  }
  const row = rows[0]
  return {
    supply:
      row === undefined || row.lowest === null || row.highest === null
        ? null
        : { lowestV: row.lowest, highestV: row.highest, count: row.count },
    air:
      row === undefined || row.air === null || row.air_at === null
        ? null
        : { at: row.air_at.getTime(), airC: row.air },
  }
}
