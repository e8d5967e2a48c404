import { noteAudit } from '@/db/queries/audit'
import { readParts, replaceParts } from '@/db/queries/systems'
import { checkedWrite } from '@/lib/access/checked-write'
import { requireSystemRight } from '@/lib/access/require-right'
import type { PartInput } from '@/shared/schemas'

/** Draws a system anew. The drawing is replaced as a whole; what it was stays in the audit trail. */
export async function setParts(
  personId: string,
  systemId: string,
  parts: PartInput[],
  now: Date,
): Promise<{ done: true }> {
  return checkedWrite(
    personId,
    (trx) => requireSystemRight(trx, systemId, 'changeSettings'),
    async (trx, standing) => {
      const before = await readParts(trx, systemId)
      await replaceParts(trx, systemId, parts)
      await noteAudit(trx, {
        at: now,
        personId,
        vesselId: standing.vesselId,
        action: 'system.parts',
        detail: { systemId, parts, before },
      })
      return { done: true }
    },
  )
}
