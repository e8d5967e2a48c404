import type { Trx } from '@/db/roles'

/** How the current person stands to a vessel they may see. */
export interface Standing {
  vesselId: string
  owns: boolean
  fullRecord: boolean
  /** It has no owner yet, and one of the person's shops keeps it. */
  keeps: boolean
  /** Roles in shops that may see it. */
  roles: string[]
}

const STANDING = `
  select v.id as "vesselId",
    v.id = any (array(select owned_vessels())) as owns,
    v.id = any (array(select full_record_vessels())) as "fullRecord",
    coalesce(v.kept_by_shop_id = any (array(select my_shops())), false) as keeps,
    array(select distinct m.role from membership m where m.person_id = current_person() and m.ended_at is null
      and (m.shop_id = v.kept_by_shop_id or m.shop_id in (
        select a.shop_id from shop_access a where a.vessel_id = v.id and a.withdrawn_at is null))) as roles
  from vessel v`

/** Null when the person may not see it, or it does not exist: the two are one. */
export async function readStanding(trx: Trx, vesselId: string): Promise<Standing | null> {
  const { rows } = await trx.raw<{ rows: Standing[] }>(`${STANDING} where v.id = ?`, [vesselId])
  return rows[0] ?? null
}

export async function readStandingOfSystem(trx: Trx, systemId: string): Promise<Standing | null> {
  const { rows } = await trx.raw<{ rows: Standing[] }>(
    `${STANDING} join system s on s.vessel_id = v.id where s.id = ?`,
    [systemId],
  )
  return rows[0] ?? null
}
