import { insertGaugeTest, insertPartChange, insertVisitEntry } from '@/db/queries/visit-parts'
import { readSystems } from '@/db/queries/systems'
import type { VisitRow } from '@/db/queries/visits'
import type { Trx } from '@/db/roles'
import { checkedWrite } from '@/lib/access/checked-write'
import type { Who } from '@/lib/auth/who'
import { Problem } from '@/lib/problem'
import type { GaugeTest, PartChange, VisitEntry } from '@/shared/schemas'
import { requireOwnVisit } from './require-visit'

/*
 * What a phone enters on a visit, perhaps long after it happened and perhaps twice: the id is made on the phone,
 * and what comes again with it changes nothing.
 */

const done = { done: true } as const

async function entering(
  who: Who,
  visitId: string,
  write: (trx: Trx, visit: VisitRow) => Promise<void>,
): Promise<{ done: true }> {
  return checkedWrite(
    who.personId,
    (trx) => requireOwnVisit(trx, who, visitId),
    async (trx, visit) => {
      await write(trx, visit)
      return done
    },
  )
}

export function addGaugeTest(who: Who, visitId: string, test: GaugeTest, now: Date): Promise<{ done: true }> {
  return entering(who, visitId, async (trx, visit) => {
    const systems = await readSystems(trx, visit.vesselId, now)
    const [only, ...others] = systems
    const system =
      visit.systemId === null
        ? others.length === 0
          ? only
          : undefined
        : systems.find((candidate) => candidate.id === visit.systemId)
    if (system === undefined)
      throw new Problem('invalid', 'The boat has several systems: say first which one the visit is about.')
    const unknown = test.partKeys.find((key) => !system.parts.some((part) => part.key === key))
    if (unknown !== undefined)
      throw new Problem('invalid', `The system has no part “${unknown}”: draw it in the set-up first.`)
    await insertGaugeTest(trx, { ...test, visitId, systemId: system.id, enteredBy: who.personId })
  })
}

export function addVisitEntry(who: Who, visitId: string, entry: VisitEntry): Promise<{ done: true }> {
  return entering(who, visitId, (trx) =>
    insertVisitEntry(trx, { ...entry, visitId, enteredBy: who.personId }),
  )
}

export function addPartChange(who: Who, visitId: string, change: PartChange): Promise<{ done: true }> {
  return entering(who, visitId, (trx) => insertPartChange(trx, { ...change, visitId }))
}
