import type { Trx } from '@/db/roles'

export interface AccessShop {
  shopId: string
  shopName: string
  level: 'figures' | 'full'
  since: Date
  people: { name: string; roles: string[] }[]
  openVisits: { id: string; status: string; startedAt: string | null }[]
}

export interface VesselAccessRows {
  owners: { personId: string; name: string; since: Date }[]
  shops: AccessShop[]
  ended: { shopName: string; level: 'figures' | 'full'; from: Date; until: Date }[]
}

/** Who can see a vessel and could before; under the service's role, for its owner. */
export async function readVesselAccess(trx: Trx, vesselId: string): Promise<VesselAccessRows> {
  const owners = await trx('vessel_owner as o')
    .join('person as p', 'p.id', 'o.person_id')
    .where({ 'o.vessel_id': vesselId })
    .whereNull('o.ended_at')
    .orderBy('o.since')
    .select<VesselAccessRows['owners']>({ personId: 'p.id', name: 'p.name', since: 'o.since' })
  const { rows: shops } = await trx.raw<{ rows: AccessShop[] }>(
    `select a.shop_id as "shopId", s.name as "shopName", a.level, a.granted_at as since,
       coalesce((select json_agg(json_build_object('name', m.name, 'roles', m.roles) order by m.name)
         from (select p.name, array_agg(m.role order by m.role) as roles from membership m
           join person p on p.id = m.person_id where m.shop_id = a.shop_id and m.ended_at is null
           group by p.id) m), '[]') as people,
       coalesce((select json_agg(json_build_object('id', v.id::text, 'status', v.status, 'startedAt',
           to_char(v.started_at at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS"Z"')) order by v.id)
         from visit v where v.vessel_id = a.vessel_id and v.shop_id = a.shop_id
           and v.status in ('under-way', 'proving')), '[]') as "openVisits"
     from shop_access a join shop s on s.id = a.shop_id
     where a.vessel_id = ? and a.withdrawn_at is null order by s.name`,
    [vesselId],
  )
  const ended = await trx('shop_access as a')
    .join('shop as s', 's.id', 'a.shop_id')
    .where({ 'a.vessel_id': vesselId })
    .whereNotNull('a.withdrawn_at')
    .orderBy('a.withdrawn_at', 'desc')
    .limit(50)
    .select<VesselAccessRows['ended']>({
      shopName: 's.name',
      level: 'a.level',
      from: 'a.granted_at',
      until: 'a.withdrawn_at',
    })
  return { owners, shops, ended }
}
