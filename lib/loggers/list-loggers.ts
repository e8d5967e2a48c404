import { readLoggers } from '@/db/queries/loggers'
import { asPerson } from '@/db/roles'
import { pageOf } from '@/lib/api/page-of'
import type { List, Logger } from '@/shared/schemas'

/** Loggers of one's shops and of the vessels one sees, by serial. */
export async function listLoggers(
  personId: string,
  query: { limit: number; cursor?: string | undefined; system?: string | undefined },
  now: Date,
): Promise<List<Logger>> {
  const rows = await asPerson(personId, (trx) => readLoggers(trx, { at: now, systemId: query.system }))
  const loggers = rows.map((row) => ({
    ...row,
    keyMadeAt: row.keyMadeAt?.toISOString() ?? null,
    retiredAt: row.retiredAt?.toISOString() ?? null,
    lastHeardAt: row.lastHeardAt?.toISOString() ?? null,
    fitted: row.fitted && { ...row.fitted, since: new Date(row.fitted.since).toISOString() },
  }))
  return pageOf(loggers, query, (logger) => logger.id)
}
