import { readShopLog, readVesselLog, type LogRow } from '@/db/queries/audit'
import { asIngest, asPerson } from '@/db/roles'
import { requireRight } from '@/lib/access/require-right'
import type { Who } from '@/lib/auth/who'
import { Problem } from '@/lib/problem'
import type { List, LogEntry } from '@/shared/schemas'
import { auditWords } from './audit-words'
import { requireManager } from './invitations'

interface Query {
  limit: number
  cursor?: string | undefined
}

/** Who saw and changed what matters on a boat, for its owner. @throws Problem `not-found`, `not-allowed` */
export async function vesselLog(who: Who, vesselId: string, query: Query): Promise<List<LogEntry>> {
  await asPerson(who.personId, (trx) => requireRight(trx, vesselId, 'giveAccess'))
  return page(query, (span) => asIngest((trx) => readVesselLog(trx, vesselId, span)))
}

/** The same for what concerns a shop, for its managers. */
export async function shopLog(who: Who, shopId: string, query: Query): Promise<List<LogEntry>> {
  requireManager(who, shopId)
  return page(query, (span) => asIngest((trx) => readShopLog(trx, shopId, span)))
}

async function page(
  query: Query,
  read: (span: { limit: number; beforeId: string | null }) => Promise<LogRow[]>,
): Promise<List<LogEntry>> {
  if (query.cursor !== undefined && !/^\d{1,18}$/.test(query.cursor))
    throw new Problem('bad-request', 'The cursor is not one that this list gave: begin again without it.')
  const rows = await read({ limit: query.limit + 1, beforeId: query.cursor ?? null })
  const items = rows.slice(0, query.limit).map((row) => ({
    id: row.id,
    at: row.at.toISOString(),
    who: row.who ?? 'Middlewatch',
    did: auditWords(row),
    vesselId: row.vesselId,
    vesselName: row.vesselName,
  }))
  const last = items[items.length - 1]
  return { items, next: rows.length > query.limit && last !== undefined ? last.id : null }
}
