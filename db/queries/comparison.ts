import type { Trx } from '@/db/roles'

const MS = (column: string) => `(extract(epoch from ${column}) * 1000)::float8`

export interface ComparisonHold {
  startedAt: number
  endedAt: number
  ending: 'leak' | 'flush' | 'unknown' | 'interrupted'
  setAside: boolean
  leakRate: { paPerHour: number; low: number; high: number } | null
  differentialPa: number | null
}

/** Holds that lie wholly in the span and were known at `at`, each with the rate of its longest leg. */
export async function readComparisonHolds(
  trx: Trx,
  systemId: string,
  span: { from: Date; to: Date; at: Date },
): Promise<ComparisonHold[]> {
  const { rows } = await trx.raw<{ rows: ComparisonHold[] }>(
    `select ${MS('h.started_at')} as "startedAt", ${MS('h.ended_at')} as "endedAt", h.ending, h.set_aside as "setAside",
       l.rate as "leakRate", h.learned_settled_pa - h.learned_cut_in_pa as "differentialPa"
     from hold h left join lateral (
       select json_build_object('paPerHour', rate_pa_per_hour, 'low', rate_low, 'high', rate_high) as rate from leg l
       where l.system_id = h.system_id and l.started_at >= h.started_at and l.started_at <= h.ended_at
         and l.hold_started_at = h.started_at and rate_pa_per_hour is not null
       order by l.ended_at - l.started_at desc limit 1) l on true
     where h.system_id = :system and h.started_at >= :from and h.ended_at <= :to and h.known_at <= :at
     order by h.started_at`,
    { system: systemId, ...span },
  )
  return rows
}

export interface ComparisonRun {
  startedAt: number
  stoppedAt: number
  rechargePaPerSecond: number | null
}

export async function readComparisonRuns(
  trx: Trx,
  systemId: string,
  span: { from: Date; to: Date; at: Date },
): Promise<ComparisonRun[]> {
  const { rows } = await trx.raw<{ rows: ComparisonRun[] }>(
    `select ${MS('started_at')} as "startedAt", ${MS('stopped_at')} as "stoppedAt",
       recharge_pa_per_second as "rechargePaPerSecond"
     from run where system_id = :system and started_at >= :from and started_at < :to and known_at <= :at
       and not interrupted order by started_at`,
    { system: systemId, ...span },
  )
  return rows
}

/** Time in the span that runs and holds, not broken by missing data, account for. */
export async function readObservedSeconds(
  trx: Trx,
  systemId: string,
  span: { from: Date; to: Date; at: Date },
): Promise<number> {
  const { rows } = await trx.raw<{ rows: { seconds: number }[] }>(
    `select coalesce(sum(extract(epoch from least(s.t, :to) - greatest(s.f, :from))), 0)::float8 as seconds
     from (select started_at as f, stopped_at as t from run where system_id = :system and known_at <= :at
         and not interrupted and started_at < :to and stopped_at > :from
       union all
       select started_at, ended_at from hold where system_id = :system and known_at <= :at
         and started_at < :to and ended_at > :from) s`,
    { system: systemId, ...span },
  )
  return rows[0]?.seconds ?? 0
}
