import type { Trx } from '@/db/roles'
import type { Channel, CheckFigure, CheckKind, CheckOutcome, CommissioningWay } from '@/shared/schemas'

export interface CommissioningRow {
  id: string
  way: CommissioningWay
  serial: string
  userCode: string | null
  startedAt: Date
  startedBy: string
  startedById: string
  shopId: string | null
  fittedAt: Date | null
  setAsideAt: Date | null
  finishedAt: Date | null
  finishedBy: string | null
  passed: boolean | null
  note: string | null
  system: {
    id: string
    name: string
    vesselId: string
    vesselName: string
    timeZone: string
    utcOffsetSeconds: number
    cutOutPa: number | null
    cutInPa: number | null
    limitSeconds: number
  } | null
  logger: { id: string; intervalSeconds: number; channels: Channel[] } | null
  checks: CheckRow[]
}

export interface CheckRow {
  id: string
  kind: CheckKind
  /** Instants inside json: text. */
  beganAt: string
  doneAt: string | null
  doneBy: string | null
  outcome: CheckOutcome | null
  figures: CheckFigure[]
  given: Record<string, unknown>
  reason: string
}

const NAME = (id: string) => `(select name from person where person.id = ${id})`

const SELECT = `
  select c.id, c.way, c.serial, c.user_code as "userCode", c.started_at as "startedAt",
    coalesce(${NAME('c.started_by')}, '') as "startedBy", c.started_by as "startedById", c.shop_id as "shopId",
    c.fitted_at as "fittedAt", c.set_aside_at as "setAsideAt", c.finished_at as "finishedAt",
    ${NAME('c.finished_by')} as "finishedBy", c.passed, c.note,
    (select json_build_object('id', s.id::text, 'name', s.name, 'vesselId', v.id::text, 'vesselName', v.name,
        'timeZone', v.time_zone, 'utcOffsetSeconds', extract(epoch from (cast(:at as timestamptz) at time zone v.time_zone)
          - (cast(:at as timestamptz) at time zone 'UTC'))::int,
        'cutOutPa', g.cut_out_pa, 'cutInPa', g.cut_in_pa, 'limitSeconds', coalesce(g.limit_seconds, 10800))
      from system s join vessel v on v.id = s.vessel_id
      left join lateral (select * from setting g where g.system_id = s.id and g.in_force_from <= :at
        order by g.in_force_from desc limit 1) g on true
      where s.id = c.system_id) as system,
    (select json_build_object('id', l.id::text, 'intervalSeconds', l.interval_seconds, 'channels', l.channels)
      from logger l where l.id = c.logger_id) as logger,
    coalesce((select json_agg(json_build_object('id', k.id::text, 'kind', k.kind, 'beganAt', k.began_at,
        'doneAt', k.done_at, 'doneBy', ${NAME('k.done_by')}, 'outcome', k.outcome, 'figures', k.figures,
        'given', k.given, 'reason', k.reason) order by k.id)
      from commissioning_check k where k.commissioning_id = c.id), '[]') as checks
  from commissioning c`

/** One, with all its attempts; null when the reader may not see it. */
export async function readCommissioning(trx: Trx, id: string, at: Date): Promise<CommissioningRow | null> {
  const { rows } = await trx.raw<{ rows: CommissioningRow[] }>(`${SELECT} where c.id = :id`, { id, at })
  return rows[0] ?? null
}

/** Those not finished, the newest first: what a person can go on with. */
export async function listOpenCommissionings(trx: Trx, at: Date): Promise<CommissioningRow[]> {
  const { rows } = await trx.raw<{ rows: CommissioningRow[] }>(
    `${SELECT} where c.finished_at is null order by c.started_at desc limit 200`,
    { at },
  )
  return rows
}

/** The newest record of a logger: the finished one, else the one under way. */
export async function readCommissioningOfLogger(
  trx: Trx,
  loggerId: string,
  at: Date,
): Promise<CommissioningRow | null> {
  const { rows } = await trx.raw<{ rows: CommissioningRow[] }>(
    `${SELECT} where c.logger_id = cast(:loggerId as integer)
     order by c.finished_at is null, c.started_at desc limit 1`,
    { loggerId, at },
  )
  return rows[0] ?? null
}

export async function insertCommissioning(
  trx: Trx,
  row: {
    startedBy: string
    shopId: string | null
    startedAt: Date
    way: CommissioningWay
    serial: string
    userCode: string | null
    systemId: string | null
  },
): Promise<string> {
  const [made] = await trx('commissioning')
    .insert({
      started_by: row.startedBy,
      shop_id: row.shopId,
      started_at: row.startedAt,
      way: row.way,
      serial: row.serial,
      user_code: row.userCode,
      system_id: row.systemId,
    })
    .returning<{ id: string }[]>('id')
  if (made === undefined) throw new Error('the commissioning was not inserted')
  return made.id
}

export async function updateCommissioning(
  trx: Trx,
  id: string,
  change: {
    systemId?: string
    userCode?: string | null
    serial?: string
    loggerId?: string
    fittedAt?: Date
    setAsideAt?: Date | null
  },
): Promise<void> {
  const columns = {
    system_id: change.systemId,
    user_code: change.userCode,
    serial: change.serial,
    logger_id: change.loggerId,
    fitted_at: change.fittedAt,
    set_aside_at: change.setAsideAt,
  }
  const named = Object.fromEntries(Object.entries(columns).filter(([, value]) => value !== undefined))
  if (Object.keys(named).length > 0) await trx('commissioning').where({ id }).update(named)
}

export async function finishCommissioning(
  trx: Trx,
  id: string,
  end: { at: Date; by: string; passed: boolean; note: string | null },
): Promise<void> {
  await trx('commissioning').where({ id }).update({
    finished_at: end.at,
    finished_by: end.by,
    passed: end.passed,
    note: end.note,
    set_aside_at: null,
  })
}

/** Locked until the end of the transaction, so that two phones cannot conclude the same step at once. */
export async function lockCommissioning(trx: Trx, id: string): Promise<void> {
  await trx('commissioning').where({ id }).forUpdate().first('id')
}

/** A new attempt; one of the same kind that was begun and never concluded is forgotten. */
export async function beginCheck(trx: Trx, id: string, kind: CheckKind, at: Date): Promise<string> {
  await trx('commissioning_check').where({ commissioning_id: id, kind }).whereNull('done_at').delete()
  const [made] = await trx('commissioning_check')
    .insert({ commissioning_id: id, kind, began_at: at })
    .returning<{ id: string }[]>('id')
  if (made === undefined) throw new Error('the check was not inserted')
  return made.id
}

/** What can be said of a check that goes on. */
export async function noteSoFar(
  trx: Trx,
  checkId: string,
  soFar: { figures: CheckFigure[]; reason: string },
): Promise<void> {
  await trx('commissioning_check')
    .where({ id: checkId })
    .update({ figures: JSON.stringify(soFar.figures), reason: soFar.reason })
}

export async function concludeCheck(
  trx: Trx,
  checkId: string,
  end: {
    at: Date
    by: string
    outcome: CheckOutcome
    given: Record<string, unknown>
    figures: CheckFigure[]
    reason: string
  },
): Promise<void> {
  await trx('commissioning_check')
    .where({ id: checkId })
    .update({
      done_at: trx.raw('greatest(cast(? as timestamptz), began_at)', [end.at]),
      done_by: end.by,
      outcome: end.outcome,
      given: JSON.stringify(end.given),
      figures: JSON.stringify(end.figures),
      reason: end.reason,
    })
}

export interface LoggerHealthRow {
  loggerId: string
  supplyV: number | null
  supplyAt: Date | null
  lowSupplyV: number | null
  silenceSeconds: number | null
}

/** Supply voltage and limits of every logger the person sees. */
export async function readLoggerHealth(trx: Trx): Promise<LoggerHealthRow[]> {
  const { rows } = await trx.raw<{ rows: LoggerHealthRow[] }>(
    `select logger_id::text as "loggerId", supply_v::float8 as "supplyV", supply_at as "supplyAt",
       low_supply_v::float8 as "lowSupplyV", silence_seconds as "silenceSeconds" from logger_health()`,
  )
  return rows
}

/** When a logger was last heard and how far its clock is off. */
export async function readLoggerHeard(
  trx: Trx,
  loggerId: string,
): Promise<{ lastHeardAt: Date | null; clockOffsetSeconds: number | null }> {
  const row = await trx('logger')
    .where({ id: loggerId })
    .first<{ lastHeardAt: Date | null; clockOffsetSeconds: number | null }>({
      lastHeardAt: 'last_heard_at',
      clockOffsetSeconds: 'clock_offset_seconds',
    })
  return row ?? { lastHeardAt: null, clockOffsetSeconds: null }
}

/** The system a logger is fitted to now, or null in stock. */
export async function fittedTo(trx: Trx, loggerId: string): Promise<string | null> {
  const { rows } = await trx.raw<{ rows: { systemId: string }[] }>(
    `select system_id::text as "systemId" from logger_fitting
     where logger_id = cast(? as integer) and upper_inf(span)`,
    [loggerId],
  )
  return rows[0]?.systemId ?? null
}

/** Puts a retired logger back to use without a new key. */
export async function takeBack(trx: Trx, loggerId: string): Promise<void> {
  await trx('logger').where({ id: loggerId }).update({ retired_at: null })
}

export interface RawReading {
  atMs: number
  vacuumPa: number | null
  pumpOn: boolean | null
  airC: number | null
  barometerPa: number | null
  supplyV: number | null
}

/** A logger's newest samples as stored in (from, to], ascending, at most `limit`. Service's role. */
export async function newestReadings(
  trx: Trx,
  loggerId: string,
  span: { from: Date; to: Date; limit: number },
): Promise<RawReading[]> {
  const { rows } = await trx.raw<{ rows: RawReading[] }>(
    `select * from (
       select (extract(epoch from at) * 1000)::float8 as "atMs", vacuum_pa::float8 as "vacuumPa", pump_on as "pumpOn",
         air_c::float8 as "airC", barometer_pa::float8 as "barometerPa", supply_v::float8 as "supplyV"
       from sample where logger_id = cast(:loggerId as integer) and at > :from and at <= :to
       order by at desc limit :limit) x
     order by "atMs"`,
    { loggerId, ...span },
  )
  return rows
}

/** The correction of a logger's vacuum in force at an instant: (as read − offset) × gain. */
export async function readCorrection(
  trx: Trx,
  loggerId: string,
  at: Date,
): Promise<{ vacuumOffsetPa: number; vacuumGain: number }> {
  const { rows } = await trx.raw<{ rows: { vacuumOffsetPa: number; vacuumGain: number }[] }>(
    `select vacuum_offset_pa::float8 as "vacuumOffsetPa", vacuum_gain::float8 as "vacuumGain" from calibration
     where logger_id = cast(:loggerId as integer) and in_force_from <= :at order by in_force_from desc limit 1`,
    { loggerId, at },
  )
  return rows[0] ?? { vacuumOffsetPa: 0, vacuumGain: 1 }
}

/** What is said of a system at an instant, and since when. */
export async function saidOfSystem(
  trx: Trx,
  systemId: string,
  at: Date,
): Promise<{ value: string; from: Date } | null> {
  const { rows } = await trx.raw<{ rows: { value: string; from: Date }[] }>(
    `select value, from_at as "from" from statement
     where system_id = :systemId and from_at <= :at and (until_at is null or until_at > :at)
     order by from_at desc, id desc limit 1`,
    { systemId, at },
  )
  return rows[0] ?? null
}
