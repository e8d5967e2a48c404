import {
  listOpenCommissionings,
  readCommissioningOfLogger,
  readLoggerHealth,
} from '@/db/queries/commissioning'
import { asPerson } from '@/db/roles'
import { noSuch } from '@/lib/access/require-right'
import { pageOf } from '@/lib/api/page-of'
import type { Who } from '@/lib/auth/who'
import { requireLoggerSeen } from '@/lib/loggers/require-logger'
import type { Commissioning, List, LoggerHealth } from '@/shared/schemas'
import { commissioningOnWire } from './on-wire'
import { requireCommissioning } from './require-commissioning'

type Page = { limit: number; cursor?: string | undefined }

/** Those not signed off that the person sees, the newest first. */
export async function listCommissionings(who: Who, page: Page, now: Date): Promise<List<Commissioning>> {
  const rows = await asPerson(who.personId, (trx) => listOpenCommissionings(trx, now))
  return pageOf(rows.map(commissioningOnWire), page, (item) => item.id)
}

/** @throws Problem `not-found`, `not-allowed` */
export async function getCommissioning(who: Who, id: string, now: Date): Promise<Commissioning> {
  return commissioningOnWire(await asPerson(who.personId, (trx) => requireCommissioning(trx, who, id, now)))
}

/** A logger's record, for everybody who sees its system. @throws Problem `not-found` */
export async function getCommissioningRecord(who: Who, loggerId: string, now: Date): Promise<Commissioning> {
  return asPerson(who.personId, async (trx) => {
    await requireLoggerSeen(trx, loggerId, now)
    const row = await readCommissioningOfLogger(trx, loggerId, now)
    if (row === null) throw noSuch('commissioning record')
    return commissioningOnWire(row)
  })
}

/** Supply voltage of one's loggers and what they are judged by. */
export async function listLoggerHealth(who: Who, page: Page): Promise<List<LoggerHealth>> {
  const rows = await asPerson(who.personId, readLoggerHealth)
  return pageOf(
    rows.map((row) => ({ ...row, supplyAt: row.supplyAt?.toISOString() ?? null })),
    page,
    (item) => item.loggerId,
  )
}
