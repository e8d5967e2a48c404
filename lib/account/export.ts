import { readExport } from '@/db/queries/export'
import { noteAudit } from '@/db/queries/audit'
import { asIngest } from '@/db/roles'
import type { Who } from '@/lib/auth/who'

/** All that is kept of a person, and the record of their boats but for the samples, to take away as one file. */
export async function exportAccount(who: Who, now: Date): Promise<Record<string, unknown>> {
  return asIngest(async (trx) => {
    const found = await readExport(trx, who.personId)
    await noteAudit(trx, { at: now, personId: who.personId, action: 'account.exported' })
    // Through JSON once, so that instants leave as text like everywhere.
    return JSON.parse(JSON.stringify({ madeAt: now, ...found }))
  })
}
