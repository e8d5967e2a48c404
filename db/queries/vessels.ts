import type { Trx } from '@/db/roles'

export interface NewVessel {
  name: string
  timeZone: string
  quietHours: { start: string; end: string } | undefined
  altitudeM: number | undefined
  harbour: string | undefined
  berth: string | null | undefined
  keptByShopId: string | null
}

export async function insertVessel(trx: Trx, vessel: NewVessel): Promise<string> {
  const [row] = await trx('vessel')
    .insert({
      name: vessel.name,
      time_zone: vessel.timeZone,
      harbour: vessel.harbour ?? null,
      berth: vessel.berth ?? null,
      kept_by_shop_id: vessel.keptByShopId,
      ...(vessel.altitudeM === undefined ? {} : { altitude_m: vessel.altitudeM }),
      ...(vessel.quietHours === undefined
        ? {}
        : { quiet_start: vessel.quietHours.start, quiet_end: vessel.quietHours.end }),
    })
    .returning<{ id: string }[]>('id')
  if (row === undefined) throw new Error('the vessel was not inserted')
  return row.id
}

export interface VesselChange {
  name?: string | undefined
  timeZone?: string | undefined
  quietHours?: { start: string; end: string } | undefined
  altitudeM?: number | undefined
  harbour?: string | null | undefined
  berth?: string | null | undefined
}

export async function updateVessel(trx: Trx, vesselId: string, change: VesselChange): Promise<void> {
  const columns = {
    name: change.name,
    time_zone: change.timeZone,
    quiet_start: change.quietHours?.start,
    quiet_end: change.quietHours?.end,
    altitude_m: change.altitudeM,
    harbour: change.harbour,
    berth: change.berth,
  }
  const named = Object.fromEntries(Object.entries(columns).filter(([, value]) => value !== undefined))
  if (Object.keys(named).length > 0) await trx('vessel').where({ id: vesselId }).update(named)
}

export async function addOwner(trx: Trx, vesselId: string, personId: string, since: Date): Promise<void> {
  await trx('vessel_owner').insert({ vessel_id: vesselId, person_id: personId, since })
}

/** A shop's access at a level; what it had before is withdrawn and kept as history. */
export async function grantAccess(
  trx: Trx,
  grant: { vesselId: string; shopId: string; level: 'figures' | 'full'; grantedBy: string; at: Date },
): Promise<void> {
  await withdrawAccess(trx, grant.vesselId, grant.shopId, grant.at)
  await trx('shop_access').insert({
    vessel_id: grant.vesselId,
    shop_id: grant.shopId,
    level: grant.level,
    granted_by: grant.grantedBy,
    granted_at: grant.at,
  })
}

/** Answers whether there was anything to withdraw. */
export async function withdrawAccess(trx: Trx, vesselId: string, shopId: string, at: Date): Promise<boolean> {
  const count = await trx('shop_access')
    .where({ vessel_id: vesselId, shop_id: shopId })
    .whereNull('withdrawn_at')
    .update({ withdrawn_at: trx.raw('greatest(cast(? as timestamptz), granted_at)', [at]) })
  return count > 0
}

export async function shopExists(trx: Trx, shopId: string): Promise<boolean> {
  return (await trx('shop').where({ id: shopId }).first('id')) !== undefined
}

export async function listAllShops(
  trx: Trx,
): Promise<{ id: string; name: string; harbour: string | null; timeZone: string }[]> {
  return trx('shop')
    .orderBy('name')
    .select({ id: 'id', name: 'name', harbour: 'harbour', timeZone: 'time_zone' })
}

export interface VesselRow {
  id: string
  name: string
  harbour: string | null
  berth: string | null
  timeZone: string
  utcOffsetSeconds: number
  localTime: string
  altitudeM: number
  quietHours: { start: string; end: string }
  owner: { id: string; name: string; email: string } | null
  keptBy: { id: string; name: string } | null
  access: { shopId: string; shopName: string; level: 'figures' | 'full'; grantedAt: Date }[]
  aboard: { value: 'aboard' | 'away'; until: Date | null } | null
}

/** One vessel with its people; the row-level policies leave out what the reader may not see. */
export async function readVessel(trx: Trx, vesselId: string, at: Date): Promise<VesselRow | null> {
  const { rows } = await trx.raw<{ rows: Omit<VesselRow, 'access' | 'aboard'>[] }>(
    `select v.id, v.name, v.harbour, v.berth, v.time_zone as "timeZone",
       extract(epoch from (cast(:at as timestamptz) at time zone v.time_zone)
         - (cast(:at as timestamptz) at time zone 'UTC'))::int as "utcOffsetSeconds",
       to_char(cast(:at as timestamptz) at time zone v.time_zone, 'YYYY-MM-DD"T"HH24:MI') as "localTime",
       v.altitude_m as "altitudeM",
       json_build_object('start', to_char(v.quiet_start, 'HH24:MI'), 'end', to_char(v.quiet_end, 'HH24:MI')) as "quietHours",
       (select json_build_object('id', p.id::text, 'name', p.name, 'email', p.email)
         from vessel_owner o join person p on p.id = o.person_id
         where o.vessel_id = v.id and o.ended_at is null order by o.since limit 1) as owner,
       (select json_build_object('id', s.id::text, 'name', s.name) from shop s where s.id = v.kept_by_shop_id) as "keptBy"
     from vessel v where v.id = :vessel`,
    { vessel: vesselId, at },
  )
  const vessel = rows[0]
  if (vessel === undefined) return null
  const access = await trx('shop_access as a')
    .join('shop as s', 's.id', 'a.shop_id')
    .where({ 'a.vessel_id': vesselId })
    .whereNull('a.withdrawn_at')
    .orderBy('s.name')
    .select<VesselRow['access']>({
      shopId: 'a.shop_id',
      shopName: 's.name',
      level: 'a.level',
      grantedAt: 'a.granted_at',
    })
  const { rows: said } = await trx.raw<{ rows: { value: 'aboard' | 'away'; until: Date | null }[] }>(
    `select value, until_at as until from statement where vessel_id = :vessel and system_id is null
       and from_at <= :at and (until_at is null or until_at > :at) order by from_at desc, id desc limit 1`,
    { vessel: vesselId, at },
  )
  return { ...vessel, access, aboard: said[0] ?? null }
}
