import type { Trx } from '@/db/roles'

export interface Said {
  vesselId: string
  /** Null for aboard and away, which are the vessel's. */
  systemId: string | null
  /** Null only takes back what was said before. */
  value: 'aboard' | 'away' | 'off' | 'laid-up' | 'worked-on' | null
  from: Date
  until: Date | null
  saidBy: string
  saidAt: Date
}

/** Says something from an instant on; what was said before of the same thing ends there. */
export async function say(trx: Trx, said: Said): Promise<void> {
  await trx.raw(
    `update statement set until_at = greatest(from_at, :from)
     where vessel_id = :vessel and system_id is not distinct from cast(:system as bigint)
       and (until_at is null or until_at > :from)`,
    { vessel: said.vesselId, system: said.systemId, from: said.from },
  )
  if (said.value === null) return
  await trx('statement').insert({
    vessel_id: said.vesselId,
    system_id: said.systemId,
    value: said.value,
    from_at: said.from,
    until_at: said.until,
    said_by: said.saidBy,
    said_at: said.saidAt,
  })
}
