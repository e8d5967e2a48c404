import { noteAudit } from '@/db/queries/audit'
import { say } from '@/db/queries/statements'
import { checkedWrite } from '@/lib/access/checked-write'
import { requireRight } from '@/lib/access/require-right'

/** Says whether anybody is aboard from now on; null takes the word back, and flushes tell again. */
export async function setAboard(
  personId: string,
  vesselId: string,
  said: { value: boolean | null; until?: string | null | undefined },
  now: Date,
): Promise<{ value: boolean | null; until: string | null }> {
  const until = said.value === null || said.until == null ? null : new Date(said.until)
  return checkedWrite(
    personId,
    (trx) => requireRight(trx, vesselId, 'setAboard'),
    async (trx) => {
      await say(trx, {
        vesselId,
        systemId: null,
        value: said.value === null ? null : said.value ? 'aboard' : 'away',
        from: now,
        until: until !== null && until < now ? now : until,
        saidBy: personId,
        saidAt: now,
      })
      await noteAudit(trx, { at: now, personId, vesselId, action: 'vessel.aboard', detail: { ...said } })
      return { value: said.value, until: until?.toISOString() ?? null }
    },
  )
}
