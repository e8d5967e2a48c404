import type { Trx } from '@/db/roles'

const ms = (column: string) => `(extract(epoch from ${column}) * 1000)::float8`
const instant = (at: number): string => new Date(at).toISOString()

export interface CupTestRow {
  id: string
  partKey: string | null
  headName: string
  /** Epoch milliseconds. */
  waterAt: number
}

/** The newest cup tests told and not taken back at `atMs`, the newest first. */
export async function readCupTests(
  trx: Trx,
  systemId: string,
  span: { atMs: number; limit: number },
): Promise<CupTestRow[]> {
  const { rows } = await trx.raw<{ rows: CupTestRow[] }>(
    `select id::text, part_key as "partKey", head_name as "headName", ${ms('water_at')} as "waterAt"
     from cup_test where system_id = :system and said_at <= :at and (taken_back_at is null or taken_back_at > :at)
     order by water_at desc, id desc limit :limit`,
    { system: systemId, at: instant(span.atMs), limit: span.limit },
  )
  return rows
}

/** Equal arrays, one entry a bin, as the leg keeps them. */
export interface CupLegBins {
  widthSeconds: number
  offsetSeconds: number[]
  count: number[]
  vacuumPa: number[]
  airC: (number | null)[]
  laggedAirC: [(number | null)[], (number | null)[]]
  barometerPa: (number | null)[]
}

export interface CupLeg {
  startedAt: number
  endedAt: number
  rate: { paPerHour: number; low: number; high: number } | null
  /** Only where one of the edges lies within the leg, so that it can be cut there. */
  bins: CupLegBins | null
}

/** The newest `limit` legs that touch the span, as known at `atMs`, oldest first. */
export async function readCupLegs(
  trx: Trx,
  systemId: string,
  span: { fromMs: number; toMs: number; atMs: number; edgesMs: readonly number[]; limit: number },
): Promise<CupLeg[]> {
  const { rows } = await trx.raw<{ rows: CupLeg[] }>(
    `select ${ms('started_at')} as "startedAt", ${ms('ended_at')} as "endedAt",
       case when rate_pa_per_hour is not null then json_build_object('paPerHour', rate_pa_per_hour, 'low', rate_low,
         'high', rate_high) end as rate,
       case when exists (select 1 from unnest(cast(:edges as timestamptz[])) e where e > started_at and e < ended_at)
         then bins end as bins
     from leg where system_id = :system and started_at < :to and ended_at > :from and known_at <= :at
       and not set_aside
     order by started_at desc limit :limit`,
    {
      system: systemId,
      from: instant(span.fromMs),
      to: instant(span.toMs),
      at: instant(span.atMs),
      edges: span.edgesMs.map(instant),
      limit: span.limit,
    },
  )
  return rows.reverse()
}

/** Flushes of the span known at `atMs`, epoch milliseconds, oldest first. */
export async function readCupFlushes(
  trx: Trx,
  systemId: string,
  span: { fromMs: number; toMs: number; atMs: number },
): Promise<number[]> {
  const { rows } = await trx.raw<{ rows: { at: number }[] }>(
    `select ${ms('at')} as at from flush where system_id = ? and at >= ? and at <= ? and known_at <= ? order by flush.at`,
    [systemId, instant(span.fromMs), instant(span.toMs), instant(span.atMs)],
  )
  return rows.map((row) => row.at)
}

/** The name of a head on the system's drawing; null when it has no such head. */
export async function readHeadName(trx: Trx, systemId: string, key: string): Promise<string | null> {
  const row = await trx('part')
    .where({ system_id: systemId, key, kind: 'head' })
    .first<{ name: string } | undefined>('name')
  return row?.name ?? null
}

/** Begins a cup test; the one before it ends there. Answers its id. */
export async function insertCupTest(
  trx: Trx,
  test: {
    systemId: string
    partKey: string | null
    headName: string
    waterAt: Date
    saidBy: string
    saidAt: Date
  },
): Promise<string> {
  await trx('cup_test')
    .where({ system_id: test.systemId })
    .whereNull('ended_at')
    .update({ ended_at: trx.raw('greatest(water_at, cast(? as timestamptz))', [test.waterAt]) })
  const [row] = await trx('cup_test')
    .insert({
      system_id: test.systemId,
      part_key: test.partKey,
      head_name: test.headName,
      water_at: test.waterAt,
      said_by: test.saidBy,
      said_at: test.saidAt,
    })
    .returning<{ id: string }[]>('id')
  return String(row?.id)
}

/** @returns false when there is no such test, or it was taken back already */
export async function takeBackCupTest(
  trx: Trx,
  systemId: string,
  testId: string,
  at: Date,
): Promise<boolean> {
  const changed = await trx('cup_test')
    .where({ id: testId, system_id: systemId })
    .whereNull('taken_back_at')
    .update({ taken_back_at: trx.raw('greatest(said_at, cast(? as timestamptz))', [at]) })
  return changed > 0
}
