import type { Trx } from '@/db/roles'
import type { Channel } from '@/shared/schemas'

/** The first fitting of a system reaches back to here: what a logger kept before it was registered counts too. */
const BEGINNING = new Date(0)

export interface LoggerRow {
  id: string
  serial: string
  shopId: string | null
  intervalSeconds: number
  channels: Channel[]
  keyMadeAt: Date | null
  retiredAt: Date | null
  lastHeardAt: Date | null
  clockOffsetSeconds: number | null
  fitted: {
    vesselId: string
    vesselName: string
    systemId: string
    systemName: string
    since: string
  } | null
}

/** Loggers the person may see, by serial. */
export async function readLoggers(
  trx: Trx,
  filter: { at: Date; systemId?: string | undefined; loggerId?: string | undefined },
): Promise<LoggerRow[]> {
  const { rows } = await trx.raw<{ rows: LoggerRow[] }>(
    `select * from (
       select l.id::text as id, l.serial, l.shop_id as "shopId", l.interval_seconds as "intervalSeconds", l.channels,
         l.key_made_at as "keyMadeAt", l.retired_at as "retiredAt", l.last_heard_at as "lastHeardAt",
         l.clock_offset_seconds as "clockOffsetSeconds",
         (select json_build_object('vesselId', v.id::text, 'vesselName', v.name, 'systemId', s.id::text,
             'systemName', s.name, 'since', lower(f.span))
           from logger_fitting f join system s on s.id = f.system_id join vessel v on v.id = s.vessel_id
           where f.logger_id = l.id and upper_inf(f.span)) as fitted
       from logger l where cast(:logger as integer) is null or l.id = :logger) x
     where cast(:system as text) is null or fitted->>'systemId' = :system
     order by serial`,
    { logger: filter.loggerId ?? null, system: filter.systemId ?? null },
  )
  return rows
}

export interface KnownLogger {
  id: string
  shopId: string | null
  retiredAt: Date | null
  /** The system it is fitted to now. */
  systemId: string | null
}

/** A logger by its serial, seen by the service; locked until the end of the transaction. */
export async function lockLoggerBySerial(trx: Trx, serial: string): Promise<KnownLogger | null> {
  const { rows } = await trx.raw<{ rows: KnownLogger[] }>(
    `select l.id::text as id, l.shop_id as "shopId", l.retired_at as "retiredAt",
       (select f.system_id from logger_fitting f where f.logger_id = l.id and upper_inf(f.span)) as "systemId"
     from logger l where l.serial = ? for update of l`,
    [serial],
  )
  return rows[0] ?? null
}

export interface LoggerKeyed {
  serial: string
  shopId: string | null
  intervalSeconds: number
  channels: Channel[]
  keyHash: Buffer
  keyMadeAt: Date
}

export async function insertLogger(trx: Trx, logger: LoggerKeyed): Promise<string> {
  const [row] = await trx('logger')
    .insert({
      serial: logger.serial,
      shop_id: logger.shopId,
      interval_seconds: logger.intervalSeconds,
      channels: logger.channels,
      key_hash: logger.keyHash,
      key_made_at: logger.keyMadeAt,
    })
    .returning<{ id: number }[]>('id')
  if (row === undefined) throw new Error('the logger was not inserted')
  return String(row.id)
}

/** Registers a known logger again: new key, rhythm and channels, no longer retired. */
export async function registerAgain(trx: Trx, loggerId: string, logger: LoggerKeyed): Promise<void> {
  await trx('logger').where({ id: loggerId }).update({
    shop_id: logger.shopId,
    interval_seconds: logger.intervalSeconds,
    channels: logger.channels,
    key_hash: logger.keyHash,
    key_made_at: logger.keyMadeAt,
    retired_at: null,
  })
}

export async function setKey(trx: Trx, loggerId: string, keyHash: Buffer, at: Date): Promise<void> {
  await trx('logger').where({ id: loggerId }).update({ key_hash: keyHash, key_made_at: at })
}

/** Retires it; the key stays known, so that it can be told that it is retired. */
export async function retire(trx: Trx, loggerId: string, at: Date): Promise<void> {
  await trx('logger').where({ id: loggerId }).whereNull('retired_at').update({ retired_at: at })
}

/** Ends what is fitted now, of the logger or at the system. Answers the systems whose record it touches. */
export async function endFittings(
  trx: Trx,
  of: { loggerId?: string; systemId?: string },
  at: Date,
): Promise<string[]> {
  const { rows } = await trx.raw<{ rows: { system_id: string }[] }>(
    `update logger_fitting set span = tstzrange(lower(span), greatest(cast(:at as timestamptz), lower(span) + interval '1 millisecond'))
     where upper_inf(span) and (logger_id = cast(:logger as integer) or system_id = cast(:system as bigint))
     returning system_id`,
    { at, logger: of.loggerId ?? null, system: of.systemId ?? null },
  )
  return rows.map((row) => row.system_id)
}

/**
 * Fits a logger to a system from an instant on; without one, from where the system's and the logger's earlier
 * fittings ended, or from the beginning of time for the first of both.
 */
export async function fit(
  trx: Trx,
  fitting: { loggerId: string; systemId: string; from: Date | null; fittedBy: string | null },
): Promise<Date> {
  const { rows } = await trx.raw<{ rows: { from: Date }[] }>(
    `insert into logger_fitting (logger_id, system_id, span, fitted_by)
     select cast(:logger as integer), cast(:system as bigint), tstzrange(coalesce(cast(:from as timestamptz), (select max(upper(span)) from logger_fitting
         where logger_id = :logger or system_id = :system), cast(:beginning as timestamptz)), null), cast(:by as bigint)
     returning lower(span) as "from"`,
    {
      logger: fitting.loggerId,
      system: fitting.systemId,
      from: fitting.from,
      beginning: BEGINNING,
      by: fitting.fittedBy,
    },
  )
  return rows[0]?.from ?? BEGINNING
}

export async function insertCalibration(
  trx: Trx,
  calibration: {
    loggerId: string
    inForceFrom: Date
    vacuumOffsetPa: number
    vacuumGain: number
    doneBy: string
    doneAt: Date
  },
): Promise<void> {
  await trx('calibration')
    .insert({
      logger_id: calibration.loggerId,
      in_force_from: calibration.inForceFrom,
      vacuum_offset_pa: calibration.vacuumOffsetPa,
      vacuum_gain: calibration.vacuumGain,
      done_by: calibration.doneBy,
      done_at: calibration.doneAt,
    })
    .onConflict(['logger_id', 'in_force_from'])
    .merge()
}

/** Asks the logger, at its next upload, for a finer rhythm until an instant. */
export async function askFineRhythm(
  trx: Trx,
  loggerId: string,
  intervalSeconds: number,
  until: Date,
): Promise<void> {
  await trx('logger')
    .where({ id: loggerId })
    .update({ fine_interval_seconds: intervalSeconds, fine_until: until })
}
