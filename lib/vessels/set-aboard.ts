import { noteAudit } from '@/db/queries/audit'
import { readAboardSpans, sayAboardFor } from '@/db/queries/aboard'
import { say } from '@/db/queries/statements'
import { asPerson } from '@/db/roles'
import { checkedWrite } from '@/lib/access/checked-write'
import { requireRight } from '@/lib/access/require-right'
import { Problem } from '@/lib/problem'
import type { AboardSpan, List } from '@/shared/schemas'

/** What was said of people aboard, from now on; for those who may say it. */
export async function listAboard(personId: string, vesselId: string, now: Date): Promise<List<AboardSpan>> {
  return asPerson(personId, async (trx) => {
    await requireRight(trx, vesselId, 'setAboard')
    const items = (await readAboardSpans(trx, vesselId, now)).map((row) => ({
      ...row,
      from: row.from.toISOString(),
      until: row.until?.toISOString() ?? null,
    }))
    return { items, next: null }
  })
}

/**
 * Says whether anybody is aboard, from now on or for one span to come; null takes the word back, and flushes tell
 * again.
 * @throws Problem `not-found`, `not-allowed`, `invalid` for a span to come without an end after its beginning
 */
export async function setAboard(
  personId: string,
  vesselId: string,
  said: { value: boolean | null; from?: string | undefined; until?: string | null | undefined },
  now: Date,
): Promise<{ value: boolean | null; until: string | null }> {
  const until = said.value === null || said.until == null ? null : new Date(said.until)
  if (said.from !== undefined && new Date(said.from) > now)
    return setAboardFor(personId, vesselId, { ...said, from: said.from }, now)
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

async function setAboardFor(
  personId: string,
  vesselId: string,
  said: { value: boolean | null; from: string; until?: string | null | undefined },
  now: Date,
): Promise<{ value: boolean | null; until: string | null }> {
  const from = new Date(said.from)
  const until = said.until == null ? null : new Date(said.until)
  if (until === null || until <= from)
    throw new Problem('invalid', 'A time to come needs an end that is later than its beginning.', {
      extensions: { errors: [{ path: 'until', message: 'must be later than the beginning' }] },
    })
  return checkedWrite(
    personId,
    (trx) => requireRight(trx, vesselId, 'setAboard'),
    async (trx) => {
      const value = said.value === null ? null : said.value ? 'aboard' : 'away'
      await sayAboardFor(trx, { vesselId, value, from, until, saidBy: personId, saidAt: now })
      await noteAudit(trx, { at: now, personId, vesselId, action: 'vessel.aboard', detail: { ...said } })
      return { value: said.value, until: until.toISOString() }
    },
  )
}
