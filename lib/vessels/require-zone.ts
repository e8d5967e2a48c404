import { zoneKnown } from '@/db/queries/zones'
import type { Trx } from '@/db/roles'
import { Problem } from '@/lib/problem'

/** @throws Problem `invalid` when the database's zone data don't hold the name */
export async function requireZone(trx: Trx, timeZone: string): Promise<void> {
  if (await zoneKnown(trx, timeZone)) return
  throw new Problem('invalid', `“${timeZone}” is not a known time zone; names look like Europe/London.`, {
    extensions: { errors: [{ path: 'timeZone', message: 'is not a known time zone' }] },
  })
}
