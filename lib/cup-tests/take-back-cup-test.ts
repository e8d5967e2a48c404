import { noteAudit } from '@/db/queries/audit'
import * as cupTests from '@/db/queries/cup-tests'
import { checkedWrite } from '@/lib/access/checked-write'
import { noSuch } from '@/lib/access/require-right'
import { requireCupTestRight } from './require-cup-test-right'

/** A cup test said by mistake counts for nothing from now on. @throws Problem `not-found`, `not-allowed` */
export async function takeBackCupTest(
  personId: string,
  systemId: string,
  testId: string,
  now: Date,
): Promise<{ done: true }> {
  return checkedWrite(
    personId,
    (trx) => requireCupTestRight(trx, systemId),
    async (trx, { vesselId }) => {
      if (!(await cupTests.takeBackCupTest(trx, systemId, testId, now))) throw noSuch('cup test')
      const detail = { systemId }
      await noteAudit(trx, { at: now, personId, vesselId, action: 'cup-test.taken-back', detail })
      return { done: true }
    },
  )
}
