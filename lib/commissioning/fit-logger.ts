import { noteAudit } from '@/db/queries/audit'
import { fittedTo, takeBack, updateCommissioning } from '@/db/queries/commissioning'
import { endFittings, fit, lockLoggerBySerial } from '@/db/queries/loggers'
import { asIngest, asPerson } from '@/db/roles'
import type { Rederive } from '@/lib/access/checked-write'
import { noSuch, requireSystemRight } from '@/lib/access/require-right'
import type { Who } from '@/lib/auth/who'
import { approve } from '@/lib/loggers/answer-claim'
import { registerLogger } from '@/lib/loggers/register-logger'
import { requireLogger } from '@/lib/loggers/require-logger'
import { Problem } from '@/lib/problem'
import type { Fitted, FitLogger } from '@/shared/schemas'
import { requireOpen } from './require-commissioning'

/**
 * Fits the logger to the chosen system in the way that was chosen. What was fitted there before ends at that moment
 * and keeps its past; a logger that comes from another boat leaves its past there.
 * @returns the key only where a person has to carry it
 * @throws Problem `not-found`, `not-allowed`, `conflict` without a system, or for a serial that is somebody else's
 */
export async function fitLogger(
  who: Who,
  id: string,
  rhythm: FitLogger,
  now: Date,
  rederive: Rederive,
): Promise<Fitted> {
  const row = await asPerson(who.personId, (trx) => requireOpen(trx, who, id, now))
  if (row.system === null) throw new Problem('conflict', 'Choose the boat and its system first.')
  if (row.fittedAt !== null) throw new Problem('conflict', 'The logger is fitted already.')
  const systemId = row.system.id
  let fitted: Fitted
  if (row.way === 'claim') {
    if (row.userCode === null) throw new Problem('conflict', 'Type the code that the logger shows first.')
    const { loggerId } = await approve(who, row.userCode, { systemId, ...rhythm }, now, rederive)
    fitted = { loggerId, key: null }
  } else if (row.way === 'key') {
    const { id: loggerId, key } = await registerLogger(
      who,
      systemId,
      { serial: row.serial, ...rhythm },
      now,
      rederive,
    )
    fitted = { loggerId, key }
  } else {
    fitted = { loggerId: await fitKnown(who, { serial: row.serial, systemId, now, rederive }), key: null }
  }
  await asIngest((trx) => updateCommissioning(trx, id, { loggerId: fitted.loggerId, fittedAt: now }))
  return fitted
}

/** A logger of one's own, from stock or from another boat, with the key and rhythm it has. */
async function fitKnown(
  who: Who,
  asked: { serial: string; systemId: string; now: Date; rederive: Rederive },
): Promise<string> {
  const { serial, systemId, now, rederive } = asked
  const known = await asIngest((trx) => lockLoggerBySerial(trx, serial))
  if (known === null) throw noSuch('logger')
  const standing = await asPerson(who.personId, async (trx) => {
    await requireLogger(trx, who, known.id, now)
    return requireSystemRight(trx, systemId, 'registerLogger')
  })
  return asIngest(async (trx) => {
    await lockLoggerBySerial(trx, serial)
    if ((await fittedTo(trx, known.id)) === systemId) return known.id
    const left = await endFittings(trx, { loggerId: known.id }, now)
    const replaced = await endFittings(trx, { systemId }, now)
    await takeBack(trx, known.id)
    const since = await fit(trx, { loggerId: known.id, systemId, from: null, fittedBy: who.personId })
    await noteAudit(trx, {
      at: now,
      personId: who.personId,
      vesselId: standing.vesselId,
      action: 'logger.fitted',
      detail: { loggerId: known.id, serial, systemId },
    })
    for (const touched of new Set([...left, ...replaced, systemId])) await rederive(trx, touched, since)
    return known.id
  })
}
