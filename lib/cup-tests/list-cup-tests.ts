import { noteSeen } from '@/db/queries/audit'
import { asIngest, asPerson } from '@/db/roles'
import type { CupTestResult, List } from '@/shared/schemas'
import { cupTestsAt } from './cup-tests-at'
import { requireCupTestRight } from './require-cup-test-right'

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
  await asPerson(personId, async (trx) => {
    const { vesselId, owns } = await requireCupTestRight(trx, systemId)
    if (!owns) await noteSeen(trx, { at: now, personId, vesselId, action: 'record.seen', everyHours: 24 })
  })
  const items = await asIngest((trx) => cupTestsAt(trx, systemId, at.getTime()))
  return { items, next: null }
}
