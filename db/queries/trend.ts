import type { Trx } from '@/db/roles'

export interface DayRate {
  /** Middle of the day, epoch milliseconds. */
  at: number
  paPerHour: number
}

const MS = (column: string) => `(extract(epoch from ${column}) * 1000)::float8`

/**
 * Leak rate of each UTC day from the legs known at `at`, each weighed by how well it is known and how long it was.
 * Told from legs rather than from the days kept beside them, so that "as of then" holds.
 */
export async function readDayRates(
  trx: Trx,
  systemId: string,
  span: { from: Date; to: Date; at: Date },
): Promise<DayRate[]> {
  const { rows } = await trx.raw<{ rows: DayRate[] }>(
    `select ${MS("date_bin('1 day', started_at, '1970-01-01T00:00:00Z') + interval '12 hours'")} as at,
       sum(w * rate_pa_per_hour) / sum(w) as "paPerHour"
     from (select started_at, rate_pa_per_hour, 1 / power(greatest((rate_high - rate_low) / 3.92, 1), 2) as w
       from leg where system_id = :system and rate_pa_per_hour is not null and not set_aside
         and started_at >= :from and started_at < :to and known_at <= :at) x
     group by 1 order by 1`,
    { system: systemId, ...span },
  )
  return rows
}

export interface LegScale {
  startedAt: number
  endedAt: number
  paPerHour: number
  sigmaPaPerHour: number
}

/** The newest `limit` legs of the span with their own rates, oldest first. */
export async function readLegRates(
  trx: Trx,
  systemId: string,
  span: { from: Date; to: Date; at: Date; limit: number },
): Promise<LegScale[]> {
  const { rows } = await trx.raw<{ rows: LegScale[] }>(
    `select ${MS('started_at')} as "startedAt", ${MS('ended_at')} as "endedAt", rate_pa_per_hour as "paPerHour",
       greatest((rate_high - rate_low) / 3.92, 1) as "sigmaPaPerHour"
     from leg where system_id = :system and rate_pa_per_hour is not null and not set_aside
       and started_at >= :from and started_at < :to and known_at <= :at order by started_at desc limit :limit`,
    { system: systemId, ...span },
  )
  return rows.reverse()
}

/** Holds that the pump ended by itself, for boats whose holds are too short for legs. */
export async function readShortHolds(
  trx: Trx,
  systemId: string,
  span: { from: Date; to: Date; at: Date; limit: number },
): Promise<LegScale[]> {
  const { rows } = await trx.raw<{ rows: LegScale[] }>(
    `select ${MS('started_at')} as "startedAt", ${MS('ended_at')} as "endedAt",
       (settled_pa - end_pa) / seconds * 3600 as "paPerHour",
       greatest((settled_pa - end_pa) / seconds * 3600 * greatest(edge_uncertainty_seconds, 1) / seconds, 1) as "sigmaPaPerHour"
     from (select *, extract(epoch from ended_at - started_at)::float8 as seconds from hold) h
     where system_id = :system and ending = 'leak' and flushes = 0 and not set_aside and seconds between 1 and 900
       and settled_pa > end_pa and started_at >= :from and started_at < :to and known_at <= :at
     order by started_at desc limit :limit`,
    { system: systemId, ...span },
  )
  return rows.reverse()
}
