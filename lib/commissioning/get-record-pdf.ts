import { asPerson } from '@/db/roles'
import { zoneOffsets } from '@/db/queries/zones'
import type { Who } from '@/lib/auth/who'
import type { VacuumUnit } from '@/shared/units'
import { getCommissioningRecord } from './read-commissionings'
import { recordPdf } from './record-pdf'

/** A logger's record as a PDF in the reader's unit. @throws Problem `not-found` */
export async function getRecordPdf(who: Who, loggerId: string, unit: VacuumUnit, now: Date): Promise<Buffer> {
  const record = await getCommissioningRecord(who, loggerId, now)
  const zone = record.system?.timeZone ?? 'Etc/UTC'
  const offsets = await asPerson(who.personId, (trx) =>
    zoneOffsets(trx, zone, new Date(record.startedAt), new Date(now.getTime() + 1)),
  )
  const local = (instant: string): string => {
    const ms = Date.parse(instant)
    const seconds = offsets.findLast(({ from }) => from.getTime() <= ms)?.seconds ?? offsets[0]?.seconds ?? 0
    return new Date(ms + seconds * 1000).toISOString().slice(0, 16).replace('T', ' ')
  }
  return recordPdf(record, unit, local)
}
