import type { Trx } from '@/db/roles'

/** Rows of a system known at an instant, oldest first, in the words of the fold; times epoch milliseconds. */
export interface RecordSpan {
  atMs: number
  /** Only rows that end (flushes: lie) at or after this. */
  fromMs: number
}

const ms = (column: string) => `(extract(epoch from ${column}) * 1000)::float8`
const instant = (at: number): string => new Date(at).toISOString()

export interface StoredRun {
  startedAt: number
  stoppedAt: number
  trigger: 'leak' | 'flush' | 'startup' | 'unknown'
  vacuumAtStartPa: number | null
  vacuumAtStopPa: number | null
  rechargePaPerSecond: number | null
  supplyV: number | null
  edgeUncertaintySeconds: number
  interrupted: boolean
  knownAt: number
}

export async function runsKnown(trx: Trx, systemId: string, span: RecordSpan): Promise<StoredRun[]> {
  const { rows } = await trx.raw<{ rows: StoredRun[] }>(
    `select ${ms('started_at')} as "startedAt", ${ms('stopped_at')} as "stoppedAt", trigger,
       vacuum_at_start_pa as "vacuumAtStartPa", vacuum_at_stop_pa as "vacuumAtStopPa",
       recharge_pa_per_second as "rechargePaPerSecond", supply_v as "supplyV",
       edge_uncertainty_seconds as "edgeUncertaintySeconds", interrupted, ${ms('known_at')} as "knownAt"
     from run where system_id = ? and known_at <= ? and known_at >= ? and stopped_at >= ? order by started_at`,
    [systemId, instant(span.atMs), instant(span.fromMs), instant(span.fromMs)],
  )
  return rows
}

export interface StoredHold {
  startedAt: number
  endedAt: number
  ending: 'leak' | 'flush' | 'unknown' | 'interrupted'
  flushes: number
  cutOutPa: number | null
  settledPa: number | null
  endPa: number | null
  learnedCutOutPa: number | null
  learnedSettledPa: number | null
  learnedCutInPa: number | null
  setAside: boolean
  edgeUncertaintySeconds: number
  knownAt: number
}

export async function holdsKnown(trx: Trx, systemId: string, span: RecordSpan): Promise<StoredHold[]> {
  const { rows } = await trx.raw<{ rows: StoredHold[] }>(
    `select ${ms('started_at')} as "startedAt", ${ms('ended_at')} as "endedAt", ending, flushes,
       cut_out_pa as "cutOutPa", settled_pa as "settledPa", end_pa as "endPa",
       learned_cut_out_pa as "learnedCutOutPa", learned_settled_pa as "learnedSettledPa",
       learned_cut_in_pa as "learnedCutInPa", set_aside as "setAside",
       edge_uncertainty_seconds as "edgeUncertaintySeconds", ${ms('known_at')} as "knownAt"
     from hold where system_id = ? and known_at <= ? and known_at >= ? and ended_at >= ? order by started_at`,
    [systemId, instant(span.atMs), instant(span.fromMs), instant(span.fromMs)],
  )
  return rows
}

export interface StoredFlush {
  at: number
  dropPa: number
  startedPump: boolean
  knownAt: number
}

export async function flushesKnown(trx: Trx, systemId: string, span: RecordSpan): Promise<StoredFlush[]> {
  const { rows } = await trx.raw<{ rows: StoredFlush[] }>(
    `select ${ms('at')} as "at", drop_pa as "dropPa", started_pump as "startedPump", ${ms('known_at')} as "knownAt"
     from flush where system_id = ? and known_at <= ? and known_at >= ? and at >= ? order by at`,
    [systemId, instant(span.atMs), instant(span.fromMs), instant(span.fromMs)],
  )
  return rows
}

export interface StoredLeg {
  holdStartedAt: number
  startedAt: number
  endedAt: number
  sinceFlushSeconds: number | null
  bins: {
    widthSeconds: number
    offsetSeconds: number[]
    count: number[]
    vacuumPa: number[]
    airC: (number | null)[]
    laggedAirC: [(number | null)[], (number | null)[]]
    barometerPa: (number | null)[]
  }
  rate: { paPerHour: number; low: number; high: number; compensated: boolean } | null
  setAside: boolean
  knownAt: number
}

/** The newest `limit` legs, oldest first. */
export async function legsKnown(
  trx: Trx,
  systemId: string,
  span: RecordSpan,
  limit: number,
): Promise<StoredLeg[]> {
  const { rows } = await trx.raw<{ rows: StoredLeg[] }>(
    `select ${ms('hold_started_at')} as "holdStartedAt", ${ms('started_at')} as "startedAt",
       ${ms('ended_at')} as "endedAt", since_flush_seconds as "sinceFlushSeconds", bins,
       case when rate_pa_per_hour is not null then json_build_object('paPerHour', rate_pa_per_hour, 'low', rate_low,
         'high', rate_high, 'compensated', compensated) end as rate,
       set_aside as "setAside", ${ms('known_at')} as "knownAt"
     from leg where system_id = ? and known_at <= ? and known_at >= ? order by known_at desc, started_at desc limit ?`,
    [systemId, instant(span.atMs), instant(span.fromMs), limit],
  )
  return rows.reverse()
}

/** What the figures need of the set-up at an instant. */
export interface FiguresSetUp {
  kind: 'pass-through' | 'collecting' | 'unit' | 'two-pumps' | 'on-demand'
  cutOutPa: number | null
  cutInPa: number | null
  limitSeconds: number
  aimSeconds: number
  silenceSeconds: number
  pumpAmps: number | null
  altitudeM: number
  channels: string[]
  intervalSeconds: number | null
  /** Newest reading: a backlog that ended two days ago says nothing of these two days. */
  lastHeardMs: number | null
  /** The owner's word on who is aboard, in force at the instant. */
  said: 'aboard' | 'away' | null
  /** 17:00 by the boat's clock, today or yesterday. */
  eveningMs: number
}

/** The set-up in force at an instant (the first one told, for the time before it); null when there is no such system. */
export async function setUpAt(trx: Trx, systemId: string, atMs: number): Promise<FiguresSetUp | null> {
  const { rows } = await trx.raw<{ rows: FiguresSetUp[] }>(
    `select coalesce(s.kind, 'pass-through') as kind, s.cut_out_pa as "cutOutPa", s.cut_in_pa as "cutInPa",
       coalesce(s.limit_seconds, 10800) as "limitSeconds", coalesce(s.aim_seconds, 28800) as "aimSeconds",
       coalesce(s.silence_seconds, 21600) as "silenceSeconds", s.pump_amps as "pumpAmps", v.altitude_m as "altitudeM",
       coalesce(f.channels, '{}') as channels, f.interval_seconds as "intervalSeconds",
       ${ms('h.sampled')} as "lastHeardMs", a.value as said,
       ${ms(`((date_trunc('day', (:at::timestamptz at time zone v.time_zone) - interval '17 hours')
         + interval '17 hours') at time zone v.time_zone)`)} as "eveningMs"
     from system y join vessel v on v.id = y.vessel_id
     left join lateral (
       select * from setting where system_id = y.id
       order by in_force_from <= :at::timestamptz desc,
         case when in_force_from <= :at::timestamptz then in_force_from end desc, in_force_from limit 1) s on true
     left join lateral (
       select l.channels, l.interval_seconds from logger_fitting g join logger l on l.id = g.logger_id
       where g.system_id = y.id and g.span @> :at::timestamptz) f on true
     left join lateral (
       select max(heard.at) as sampled
       from logger_fitting g
       cross join lateral (
         select p.at from sample p where p.logger_id = g.logger_id and p.at >= lower(g.span)
           and p.at < coalesce(upper(g.span), 'infinity') and p.at <= :at::timestamptz
         order by p.at desc limit 1) heard
       where g.system_id = y.id) h on true
     left join lateral (
       select value from statement where vessel_id = y.vessel_id and system_id is null and from_at <= :at::timestamptz
         and (until_at is null or until_at > :at::timestamptz) order by from_at desc, id desc limit 1) a on true
     where y.id = :systemId`,
    { systemId, at: instant(atMs) },
  )
  return rows[0] ?? null
}
