import { noteAudit } from '@/db/queries/audit'
import { insertCupTest, readHeadName } from '@/db/queries/cup-tests'
import type { Trx } from '@/db/roles'
import { checkedWrite } from '@/lib/access/checked-write'
import { noSuch } from '@/lib/access/require-right'
import { Problem } from '@/lib/problem'
import type { CupTestResult, StartCupTest } from '@/shared/schemas'
import { cupTestsAt } from './cup-tests-at'
import { requireCupTestRight } from './require-cup-test-right'
import { WET_MS } from './spans'

/**
 * The water is in: one bowl's cup test begins. One at a time; the one before ends once it told something.
 * @throws Problem `not-found`, `not-allowed`, `invalid` for a bowl or an instant that cannot be, `conflict` while
 *   another bowl is wet and has not told yet
 */
export async function startCupTest(
  personId: string,
  systemId: string,
  said: StartCupTest,
  now: Date,
): Promise<CupTestResult> {
  const waterAt = said.at === undefined ? now : new Date(said.at)
  if (waterAt > now || now.getTime() - waterAt.getTime() > WET_MS)
    throw new Problem('invalid', 'Say when the water went in: now, or within the last twelve hours.')
  return checkedWrite(
    personId,
    (trx) => requireCupTestRight(trx, systemId),
    async (trx, { vesselId }) => {
      const headName = await nameOf(trx, systemId, said)
      const [before] = await cupTestsAt(trx, systemId, now.getTime())
      if (before?.open && before.verdict === null)
        throw new Problem(
          'conflict',
          `Water is in ${before.headName} already: flush it, or take that back, before the next bowl.`,
        )
      if (before !== undefined && Date.parse(before.waterAt) >= waterAt.getTime())
        throw new Problem('invalid', `The water went into ${before.headName} later than that.`)
      const id = await insertCupTest(trx, {
        systemId,
        partKey: said.partKey ?? null,
        headName,
        waterAt,
        saidBy: personId,
        saidAt: now,
      })
      const detail = { systemId, bowl: headName }
      await noteAudit(trx, { at: now, personId, vesselId, action: 'cup-test.started', detail })
      const begun = (await cupTestsAt(trx, systemId, now.getTime())).find((test) => test.id === id)
      if (begun === undefined) throw noSuch('cup test')
      return begun
    },
  )
}

async function nameOf(trx: Trx, systemId: string, said: StartCupTest): Promise<string> {
  if (said.partKey === undefined) return said.name ?? ''
  const name = await readHeadName(trx, systemId, said.partKey)
  if (name === null)
    throw new Problem('invalid', 'The drawing has no such head: choose another, or type a name.')
  return name
}
