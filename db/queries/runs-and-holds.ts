import type { Trx } from '@/db/roles'

export interface ListSpan {
  from: Date | null
  to: Date | null
  /** Only what was known then. */
  at: Date
  /** The start of the last item of the page before. */
  after: Date | null
  limit: number
}

export interface ListedRun {
  startedAt: Date
  stoppedAt: Date
  trigger: 'leak' | 'flush' | 'startup' | 'unknown'
  vacuumAtStartPa: number | null
  vacuumAtStopPa: number | null
  edgeUncertaintySeconds: number
  rechargePaPerSecond: number | null
  supplyV: number | null
}

const WITHIN = `x.system_id = :system and x.known_at <= :at
  and (cast(:from as timestamptz) is null or x.started_at >= :from)
  and (cast(:to as timestamptz) is null or x.started_at < :to)
  and (cast(:after as timestamptz) is null or x.started_at > :after)`

/** Runs by when they began, as the person sees them. */
export async function listRuns(trx: Trx, systemId: string, span: ListSpan): Promise<ListedRun[]> {
  const { rows } = await trx.raw<{ rows: ListedRun[] }>(
    `select started_at as "startedAt", stopped_at as "stoppedAt", trigger, vacuum_at_start_pa as "vacuumAtStartPa",
       vacuum_at_stop_pa as "vacuumAtStopPa", edge_uncertainty_seconds as "edgeUncertaintySeconds",
       recharge_pa_per_second as "rechargePaPerSecond", supply_v as "supplyV"
     from run x where ${WITHIN} order by started_at limit :limit`,
    { system: systemId, ...span },
  )
  return rows
}

export interface ListedHold {
  startedAt: Date
  endedAt: Date
  ending: 'leak' | 'flush' | 'unknown' | 'interrupted'
  flushes: number
  settledPa: number | null
  endPa: number | null
  edgeUncertaintySeconds: number
  /** Of its longest leg. */
  legRate: { paPerHour: number; low: number; high: number } | null
}

/** Holds by when they began, as the person sees them, each with the rate of its longest leg known then. */
export async function listHolds(trx: Trx, systemId: string, span: ListSpan): Promise<ListedHold[]> {
  const { rows } = await trx.raw<{ rows: ListedHold[] }>(
    `select x.started_at as "startedAt", x.ended_at as "endedAt", x.ending, x.flushes, x.settled_pa as "settledPa",
       x.end_pa as "endPa", x.edge_uncertainty_seconds as "edgeUncertaintySeconds", l.rate as "legRate"
     from hold x left join lateral (
       select json_build_object('paPerHour', l.rate_pa_per_hour, 'low', l.rate_low, 'high', l.rate_high) as rate
       from leg l where l.system_id = x.system_id and l.started_at >= x.started_at and l.started_at <= x.ended_at
         and l.hold_started_at = x.started_at and l.rate_pa_per_hour is not null and l.known_at <= :at
       order by l.ended_at - l.started_at desc limit 1) l on true
     where ${WITHIN} order by x.started_at limit :limit`,
    { system: systemId, ...span },
  )
  return rows
}

/** Longest leg already closed of a hold that is still open. */
export async function legRateOfHold(
  trx: Trx,
  systemId: string,
  holdStartedAt: Date,
  at: Date,
): Promise<{ paPerHour: number; low: number; high: number; seconds: number } | null> {
  const { rows } = await trx.raw<{
    rows: { paPerHour: number; low: number; high: number; seconds: number }[]
  }>(
    `select rate_pa_per_hour as "paPerHour", rate_low as low, rate_high as high,
       extract(epoch from ended_at - started_at)::float8 as seconds
     from leg where system_id = :system and started_at >= :start and hold_started_at = :start
       and rate_pa_per_hour is not null and known_at <= :at
     order by ended_at - started_at desc limit 1`,
    { system: systemId, start: holdStartedAt, at },
  )
  return rows[0] ?? null
}
