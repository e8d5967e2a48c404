import { asIngest, asPerson } from '@/db/roles'
import { noSuch, requireSystemRight } from '@/lib/access/require-right'
import { rightsOf } from '@/lib/access/rights'
import { summaryAt } from '@/lib/figures'
import type { Summary } from '@/shared/schemas'

/**
 * A system's summary as of an instant. The vacuum now and who is aboard belong to the full record; the rest are
 * leak figures. @throws Problem `not-found`
 */
export async function getSummary(personId: string, systemId: string, at: Date): Promise<Summary> {
  const standing = await asPerson(personId, (trx) => requireSystemRight(trx, systemId, null))
  const summary = await asIngest((trx) => summaryAt(trx, systemId, at.getTime()))
  if (summary === null) throw noSuch('system')
  return rightsOf(standing).fullRecord ? summary : { ...summary, aboard: 'unknown', current: null }
}
