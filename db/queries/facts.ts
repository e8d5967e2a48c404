import type { Trx } from '@/db/roles'

/** The dated set-up of a system as stored; times epoch milliseconds, -Infinity and Infinity where open. */
export interface StoredFacts {
  settings: { fromMs: number; kind: string; cutOutPa: number | null; cutInPa: number | null }[]
  fittings: { fromMs: number; toMs: number; loggerId: string; intervalSeconds: number; channels: string[] }[]
  statements: { id: string; fromMs: number; toMs: number; value: string }[]
  calibrations: { loggerId: string; fromMs: number; vacuumOffsetPa: number; vacuumGain: number }[]
}

const ms = (expression: string) => `(extract(epoch from ${expression}) * 1000)::float8`

/** Everything dated that the fold of a system takes in, each kind oldest first. */
export async function factsOf(trx: Trx, systemId: string): Promise<StoredFacts> {
  const { rows } = await trx.raw<{ rows: RawFact[] }>(
    `select 'setting' as what, id, ${ms('in_force_from')} as from_ms, null::float8 as to_ms, kind as word,
       null::text[] as channels, null::integer as logger_id, null::integer as seconds, cut_out_pa as a, cut_in_pa as b
     from setting where system_id = :systemId
     union all
     select 'fitting', f.id, ${ms('lower(f.span)')}, ${ms('upper(f.span)')}, null, l.channels, l.id,
       l.interval_seconds, null, null
     from logger_fitting f join logger l on l.id = f.logger_id where f.system_id = :systemId
     union all
     select 'statement', id, ${ms('from_at')}, ${ms('until_at')}, value, null, null, null, null, null
     from statement where system_id = :systemId
     union all
     select 'calibration', c.id, ${ms('c.in_force_from')}, null, null, null, c.logger_id, null, c.vacuum_offset_pa,
       c.vacuum_gain
     from calibration c
     where c.logger_id in (select logger_id from logger_fitting where system_id = :systemId)
     order by what, from_ms, id`,
    { systemId },
  )
  const facts: StoredFacts = { settings: [], fittings: [], statements: [], calibrations: [] }
  for (const row of rows) {
    const fromMs = row.from_ms
    const toMs = row.to_ms ?? Infinity
    const loggerId = String(row.logger_id)
    if (row.what === 'setting')
      facts.settings.push({ fromMs, kind: row.word ?? '', cutOutPa: row.a, cutInPa: row.b })
    else if (row.what === 'fitting')
      facts.fittings.push({
        fromMs,
        toMs,
        loggerId,
        intervalSeconds: row.seconds ?? 0,
        channels: row.channels ?? [],
      })
    else if (row.what === 'statement')
      facts.statements.push({ id: row.id, fromMs, toMs, value: row.word ?? '' })
    else facts.calibrations.push({ loggerId, fromMs, vacuumOffsetPa: row.a ?? 0, vacuumGain: row.b ?? 1 })
  }
  return facts
}

interface RawFact {
  what: 'setting' | 'fitting' | 'statement' | 'calibration'
  id: string
  from_ms: number
  to_ms: number | null
  word: string | null
  channels: string[] | null
  logger_id: number | null
  seconds: number | null
  a: number | null
  b: number | null
}

/** Systems at which a logger was ever fitted, with the spans: what a corrected date or calibration touches. */
export async function systemsOfLogger(trx: Trx, loggerId: string): Promise<string[]> {
  const { rows } = await trx.raw<{ rows: { system_id: string }[] }>(
    'select distinct system_id from logger_fitting where logger_id = ? order by system_id',
    [loggerId],
  )
  return rows.map((row) => row.system_id)
}
