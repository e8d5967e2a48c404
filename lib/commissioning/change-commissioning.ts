import { finishCommissioning, lockCommissioning, updateCommissioning } from '@/db/queries/commissioning'
import { noteAudit } from '@/db/queries/audit'
import { checkedWrite, type Rederive } from '@/lib/access/checked-write'
import { requireSystemRight } from '@/lib/access/require-right'
import type { Who } from '@/lib/auth/who'
import { getClaim } from '@/lib/loggers/answer-claim'
import { Problem } from '@/lib/problem'
import type { ChangeCommissioning, Commissioning } from '@/shared/schemas'
import { sayDone } from './at-work'
import { allPassed } from './on-wire'
import { getCommissioning } from './read-commissionings'
import { requireOpen } from './require-commissioning'

/**
 * Chooses the system, takes a newer code when the first ran out, puts it aside or takes it up again.
 * @throws Problem `conflict` for another system once the logger is fitted
 */
export async function changeCommissioning(
  who: Who,
  id: string,
  change: ChangeCommissioning,
  now: Date,
  rederive: Rederive,
): Promise<Commissioning> {
  const claim = change.userCode === undefined ? null : await getClaim(who, change.userCode, now)
  const row = await checkedWrite(
    who.personId,
    async (trx) => {
      const row = await requireOpen(trx, who, id, now)
      if (change.systemId !== undefined) await requireSystemRight(trx, change.systemId, 'registerLogger')
      if (row.fittedAt !== null && (change.systemId ?? row.system?.id) !== row.system?.id)
        throw new Problem('conflict', 'The logger is fitted already: move it from its own page.')
      if (row.fittedAt !== null && claim !== null)
        throw new Problem('conflict', 'The logger has its key already.')
      return row
    },
    async (trx, found) => {
      await updateCommissioning(trx, id, {
        ...(change.systemId === undefined ? {} : { systemId: change.systemId }),
        ...(claim === null ? {} : { userCode: claim.userCode, serial: claim.serial }),
        ...(change.setAside === undefined ? {} : { setAsideAt: change.setAside ? now : null }),
      })
      return found
    },
  )
  if (change.setAside === true) await sayDone(who, row, now, rederive)
  return getCommissioning(who, id, now)
}

/** Signs it off: who, when, and whether all that was needed passed. What did not pass stays in the record. */
export async function finish(
  who: Who,
  id: string,
  note: string | undefined,
  now: Date,
  rederive: Rederive,
): Promise<Commissioning> {
  const signedOff = await checkedWrite(
    who.personId,
    async (trx) => {
      const row = await requireOpen(trx, who, id, now)
      if (row.fittedAt === null)
        throw new Problem('conflict', 'Nothing is fitted yet: there is nothing to sign off.')
      const passed = allPassed(row)
      if (!passed && (note ?? '') === '')
        throw new Problem(
          'invalid',
          'Some checks have not passed: say in a note why it is signed off all the same.',
        )
      return { row, passed }
    },
    async (trx, { row, passed }) => {
      await lockCommissioning(trx, id)
      await finishCommissioning(trx, id, { at: now, by: who.personId, passed, note: note || null })
      await noteAudit(trx, {
        at: now,
        personId: who.personId,
        vesselId: row.system?.vesselId,
        action: 'logger.commissioned',
        detail: { commissioningId: id, loggerId: row.logger?.id, passed },
      })
      return row
    },
  )
  await sayDone(who, signedOff, now, rederive)
  return getCommissioning(who, id, now)
}
