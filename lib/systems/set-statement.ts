import type { Standing } from '@/db/queries/access'
import { noteAudit } from '@/db/queries/audit'
import { say } from '@/db/queries/statements'
import { checkedWrite, type Rederive } from '@/lib/access/checked-write'
import { requireSystemRight } from '@/lib/access/require-right'
import type { StatementValue } from '@/shared/schemas'

interface Said {
  value: StatementValue | null
  until?: string | null | undefined
}

/**
 * Says of each system that it is off, laid up or being worked on from now on; null takes it back. All or none.
 * @throws Problem `not-found` for a system one doesn't see, `not-allowed`
 */
export async function setStatements(
  personId: string,
  systemIds: readonly string[],
  said: Said,
  now: Date,
  rederive: Rederive,
): Promise<{ value: StatementValue | null; until: string | null }> {
  const until = said.value === null || said.until == null ? null : new Date(said.until)
  // In the order of ids, so that two who say something of the same boats don't wait for each other.
  const ids = [...new Set(systemIds)].sort((a, b) => Number(a) - Number(b))
  return checkedWrite(
    personId,
    async (trx) => {
      const found: { systemId: string; standing: Standing }[] = []
      for (const systemId of ids)
        found.push({ systemId, standing: await requireSystemRight(trx, systemId, 'setStatement') })
      return found
    },
    async (trx, found) => {
      for (const { systemId, standing } of found) {
        await say(trx, {
          vesselId: standing.vesselId,
          systemId,
          value: said.value,
          from: now,
          until: until !== null && until < now ? now : until,
          saidBy: personId,
          saidAt: now,
        })
        await noteAudit(trx, {
          at: now,
          personId,
          vesselId: standing.vesselId,
          action: 'system.statement',
          detail: { systemId, value: said.value, until: until?.toISOString() ?? null },
        })
        await rederive(trx, systemId, now)
      }
      return { value: said.value, until: until?.toISOString() ?? null }
    },
  )
}
