import type { Trx } from '@/db/roles'
import type { PartKind } from '@/shared/schemas/words'

export interface SuspectsPlace {
  timeZone: string
  parts: { key: string; kind: PartKind }[]
  /** When a part was last cleaned, tightened, adjusted or replaced, as known at the instant; null = never. */
  changedAt: Date | null
}

/** What the record of a system is read against: the boat's zone, the drawing's parts, the last change to a part. */
export async function readSuspectsPlace(trx: Trx, systemId: string, at: Date): Promise<SuspectsPlace | null> {
  const { rows } = await trx.raw<{ rows: SuspectsPlace[] }>(
    `select v.time_zone as "timeZone",
       coalesce((select json_agg(json_build_object('key', p.key, 'kind', p.kind) order by p.id)
         from part p where p.system_id = s.id), '[]') as parts,
       (select max(c.at) from part_change c join visit i on i.id = c.visit_id
         where i.vessel_id = s.vessel_id and (i.system_id is null or i.system_id = s.id) and c.at <= :at) as "changedAt"
     from system s join vessel v on v.id = s.vessel_id where s.id = :system`,
    { system: systemId, at },
  )
  return rows[0] ?? null
}
