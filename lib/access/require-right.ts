import { readStanding, readStandingOfSystem, type Standing } from '@/db/queries/access'
import type { Trx } from '@/db/roles'
import { Problem } from '@/lib/problem'
import type { Rights } from '@/shared/schemas'
import { rightsOf } from './rights'

export type Right = keyof Rights

/** What to say to somebody who sees a boat but may not do this. */
const REFUSALS: Record<Right, string> = {
  fullRecord: 'The owner lets you see the leak figures of this boat, not its full record.',
  changeVessel: 'Only the owner changes what is said of the boat.',
  changeQuietHours: 'Only the owner changes the quiet hours.',
  changeSettings: 'Only the owner and the shop change the system’s figures.',
  registerLogger: 'Loggers are registered and retired by the owner, an installer or the shop’s manager.',
  giveAccess: 'Only the owner decides who may see the boat.',
  setAboard: 'Only the owner, or a shop with the full record, says whether anybody is aboard.',
  setStatement: 'Only the owner and the shop say this of the system.',
  askVisit: 'Visits are asked for by the owner, or opened by a technician or manager of the shop.',
  workVisit: 'Visits are worked on by a technician or manager of the shop.',
  assignVisit: 'Visits are assigned by the shop’s manager.',
  acknowledge: 'Notices are acknowledged by the owner, a technician or the shop’s manager.',
}

export const noSuch = (what: string): Problem =>
  new Problem('not-found', `There is no such ${what}, or it is not yours to see.`)

const demand = (standing: Standing | null, right: Right | null, what: string): Standing => {
  if (standing === null) throw noSuch(what)
  if (right !== null && !rightsOf(standing)[right]) throw new Problem('not-allowed', REFUSALS[right])
  return standing
}

/**
 * How the current person stands to the vessel, having the right (null: sight is enough).
 * @throws Problem `not-found` without sight, `not-allowed` without the right
 */
export async function requireRight(trx: Trx, vesselId: string, right: Right | null): Promise<Standing> {
  return demand(await readStanding(trx, vesselId), right, 'vessel')
}

/** The same for one of its systems. */
export async function requireSystemRight(trx: Trx, systemId: string, right: Right | null): Promise<Standing> {
  return demand(await readStandingOfSystem(trx, systemId), right, 'system')
}
