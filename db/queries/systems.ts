import type { Trx } from '@/db/roles'
import type { Channel, PartInput, PartKind, StatementValue, SystemKind } from '@/shared/schemas'

export async function insertSystem(trx: Trx, vesselId: string, name: string): Promise<string> {
  const [row] = await trx('system').insert({ vessel_id: vesselId, name }).returning<{ id: string }[]>('id')
  if (row === undefined) throw new Error('the system was not inserted')
  await trx('system_state').insert({ system_id: row.id })
  return row.id
}

export async function renameSystem(trx: Trx, systemId: string, name: string): Promise<void> {
  await trx('system').where({ id: systemId }).update({ name })
}

/** The drawing of a system, in the order in which it was drawn. */
export async function readParts(trx: Trx, systemId: string): Promise<SystemRow['parts']> {
  const { rows } = await trx.raw<{ rows: SystemRow['parts'] }>(
    `select key, kind, name, volume_m3::float8 as "volumeM3", parent_key as parent
     from part where system_id = ? order by id`,
    [systemId],
  )
  return rows
}

/** Replaces the drawing: parts no longer named go, the others are changed or added. */
export async function replaceParts(trx: Trx, systemId: string, parts: PartInput[]): Promise<void> {
  await trx('part').where({ system_id: systemId }).delete()
  if (parts.length === 0) return
  await trx('part').insert(
    parts.map((part) => ({
      system_id: systemId,
      key: part.key,
      kind: part.kind,
      name: part.name,
      volume_m3: part.volumeM3 ?? null,
      parent_key: part.parent ?? null,
    })),
  )
}

export interface SystemRow {
  id: string
  name: string
  figures: { state?: string } | null
  lastHeardAt: Date | null
  parts: { key: string; kind: PartKind; name: string; volumeM3: number | null; parent: string | null }[]
  statement: { value: StatementValue; from: Date; until: Date | null } | null
  logger: {
    id: string
    serial: string
    intervalSeconds: number
    channels: Channel[]
    fittedAt: Date
    lastHeardAt: Date | null
    clockOffsetSeconds: number | null
  } | null
}

/** The systems of a vessel with parts, what is said of them, and the logger fitted at `at`. */
export async function readSystems(trx: Trx, vesselId: string, at: Date): Promise<SystemRow[]> {
  const { rows } = await trx.raw<{ rows: SystemRow[] }>(
    `select s.id, s.name, st.figures, st.last_heard_at as "lastHeardAt",
       coalesce((select json_agg(json_build_object('key', p.key, 'kind', p.kind, 'name', p.name,
           'volumeM3', p.volume_m3, 'parent', p.parent_key) order by p.id)
         from part p where p.system_id = s.id), '[]') as parts,
       (select json_build_object('value', t.value, 'from', t.from_at, 'until', t.until_at) from statement t
         where t.system_id = s.id and t.from_at <= :at and (t.until_at is null or t.until_at > :at)
         order by t.from_at desc, t.id desc limit 1) as statement,
       (select json_build_object('id', l.id::text, 'serial', l.serial, 'intervalSeconds', l.interval_seconds,
           'channels', l.channels, 'fittedAt', lower(f.span), 'lastHeardAt', l.last_heard_at,
           'clockOffsetSeconds', l.clock_offset_seconds)
         from logger_fitting f join logger l on l.id = f.logger_id
         where f.system_id = s.id and f.span @> cast(:at as timestamptz)) as logger
     from system s left join system_state st on st.system_id = s.id
     where s.vessel_id = :vessel order by s.id`,
    { vessel: vesselId, at },
  )
  // Inside json the instants arrive as text.
  return rows.map((row) => ({
    ...row,
    statement: row.statement && {
      value: row.statement.value,
      from: new Date(row.statement.from),
      until: row.statement.until && new Date(row.statement.until),
    },
    logger: row.logger && {
      ...row.logger,
      fittedAt: new Date(row.logger.fittedAt),
      lastHeardAt: row.logger.lastHeardAt && new Date(row.logger.lastHeardAt),
    },
  }))
}

export interface SettingRow {
  systemId: string
  inForceFrom: Date
  kind: SystemKind
  cutOutPa: number | null
  cutInPa: number | null
  limitSeconds: number
  aimSeconds: number
  silenceSeconds: number
  pumpAmps: number | null
  lowSupplyV: number | null
}

/** A system's figures in force at an instant; before the first, the first. One row a system. */
export async function readSettings(trx: Trx, systemIds: string[], at: Date): Promise<SettingRow[]> {
  const { rows } = await trx.raw<{ rows: SettingRow[] }>(
    `select distinct on (system_id) system_id as "systemId", in_force_from as "inForceFrom", kind,
       cut_out_pa::float8 as "cutOutPa", cut_in_pa::float8 as "cutInPa", limit_seconds as "limitSeconds",
       aim_seconds as "aimSeconds", silence_seconds as "silenceSeconds", pump_amps::float8 as "pumpAmps",
       low_supply_v::float8 as "lowSupplyV"
     from setting where system_id = any (cast(:systems as bigint[]))
     order by system_id, (in_force_from <= :at) desc,
       case when in_force_from <= :at then -extract(epoch from in_force_from) else extract(epoch from in_force_from) end`,
    { systems: systemIds, at },
  )
  return rows
}

/** A system's figures that come into force after an instant, the earliest first. */
export async function readSettingsAfter(trx: Trx, systemId: string, after: Date): Promise<SettingRow[]> {
  const { rows } = await trx.raw<{ rows: { at: Date }[] }>(
    'select in_force_from as at from setting where system_id = :system and in_force_from > :after order by 1',
    { system: systemId, after },
  )
  const found: SettingRow[] = []
  for (const { at } of rows) found.push(...(await readSettings(trx, [systemId], at)))
  return found
}

/** Corrects figures of an instant; who set them there and when stays. */
export async function correctSetting(trx: Trx, setting: SettingRow): Promise<void> {
  await trx('setting')
    .where({ system_id: setting.systemId, in_force_from: setting.inForceFrom })
    .update(figureColumns(setting))
}

const figureColumns = (setting: SettingRow) => ({
  kind: setting.kind,
  cut_out_pa: setting.cutOutPa,
  cut_in_pa: setting.cutInPa,
  limit_seconds: setting.limitSeconds,
  aim_seconds: setting.aimSeconds,
  silence_seconds: setting.silenceSeconds,
  pump_amps: setting.pumpAmps,
  low_supply_v: setting.lowSupplyV,
})

/** Writes figures from an instant on; the same instant again replaces them. */
export async function writeSetting(trx: Trx, setting: SettingRow, setBy: string, setAt: Date): Promise<void> {
  await trx('setting')
    .insert({
      system_id: setting.systemId,
      in_force_from: setting.inForceFrom,
      ...figureColumns(setting),
      set_by: setBy,
      set_at: setAt,
    })
    .onConflict(['system_id', 'in_force_from'])
    .merge()
}

/** The vessel a system is on, as the role sees it. */
export async function vesselOfSystem(trx: Trx, systemId: string): Promise<string | null> {
  const row = await trx('system').where({ id: systemId }).first<{ vessel_id: string }>('vessel_id')
  return row?.vessel_id ?? null
}
