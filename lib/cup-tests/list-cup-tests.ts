import { noteSeen } from '@/db/queries/audit'
import { readCupTests } from '@/db/queries/cup-tests'
import { asIngest, asPerson } from '@/db/roles'
import type { CupTestResult, List } from '@/shared/schemas'
import { cupTestsAt } from './cup-tests-at'
import { requireCupTestRight } from './require-cup-test-right'

const MOST_KNOWN = 1000

/**
 * The newest cup tests of a system, as known at `at`, the newest first.
 * @throws Problem `not-found`, `not-allowed` without the full record
 */
export async function listCupTests(
  personId: string,
  systemId: string,
  at: Date,
  now: Date,
): Promise<List<CupTestResult>> {
  const seen = await asPerson(personId, async (trx) => {
    const { vesselId, owns } = await requireCupTestRight(trx, systemId)
    if (!owns) await noteSeen(trx, { at: now, personId, vesselId, action: 'record.seen', everyHours: 24 })
    const rows = await readCupTests(trx, systemId, { atMs: at.getTime(), limit: MOST_KNOWN })
    return rows.map(({ id }) => id)
  })
  const items = await asIngest((trx) => cupTestsAt(trx, systemId, at.getTime()))
  // The samples' side needs the service's role; which tests there are for this person, their own decides.
  return { items: items.filter((item) => seen.includes(item.id)), next: null }
}
