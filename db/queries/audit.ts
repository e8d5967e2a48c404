import type { Trx } from '@/db/roles'

export interface AuditEntry {
  at: Date
  personId: string
  vesselId?: string | undefined
  shopId?: string | undefined
  action: string
  detail?: Record<string, unknown>
}

/** Writes down who changed what, in the transaction of the change itself. */
export async function noteAudit(trx: Trx, entry: AuditEntry): Promise<void> {
  await trx('audit_entry').insert({
    at: entry.at,
    person_id: entry.personId,
    vessel_id: entry.vesselId ?? null,
    shop_id: entry.shopId ?? null,
    action: entry.action,
    detail: JSON.stringify(entry.detail ?? {}),
  })
}
