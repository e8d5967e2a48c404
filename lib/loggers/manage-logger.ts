import { noteAudit } from '@/db/queries/audit'
import { askFineRhythm, endFittings, insertCalibration, retire, setKey } from '@/db/queries/loggers'
import { checkedWrite, type Rederive } from '@/lib/access/checked-write'
import type { Who } from '@/lib/auth/who'
import { Problem } from '@/lib/problem'
import type { LoggerKey } from '@/shared/schemas'
import { hashKey, newKey } from './key'
import { requireFitted, requireLogger } from './require-logger'

/** A new key; the old one is void at once. @throws Problem `not-found`, `not-allowed`, `conflict` when retired */
export async function rollKey(who: Who, loggerId: string, now: Date): Promise<LoggerKey> {
  return checkedWrite(
    who.personId,
    (trx) => requireLogger(trx, who, loggerId, now),
    async (trx, logger) => {
      if (logger.retiredAt !== null)
        throw new Problem('conflict', 'The logger is retired: register it again to use it.')
      const key = newKey()
      await setKey(trx, loggerId, hashKey(key), now)
      await noteAudit(trx, {
        at: now,
        personId: who.personId,
        vesselId: logger.fitted?.vesselId,
        action: 'logger.key-rolled',
        detail: { loggerId },
      })
      return { id: loggerId, key }
    },
  )
}

/** Retires a logger and ends its fitting; what it measured stays. */
export async function retireLogger(
  who: Who,
  loggerId: string,
  now: Date,
  rederive: Rederive,
): Promise<{ done: true }> {
  return checkedWrite(
    who.personId,
    (trx) => requireLogger(trx, who, loggerId, now),
    async (trx, logger) => {
      await retire(trx, loggerId, now)
      for (const systemId of await endFittings(trx, { loggerId }, now)) await rederive(trx, systemId, now)
      await noteAudit(trx, {
        at: now,
        personId: who.personId,
        vesselId: logger.fitted?.vesselId,
        action: 'logger.retired',
        detail: { loggerId },
      })
      return { done: true }
    },
  )
}

/** Corrects a logger's vacuum from an instant on, default now; the record is derived anew from there. */
export async function calibrateLogger(
  who: Who,
  loggerId: string,
  calibration: { vacuumOffsetPa: number; vacuumGain: number; inForceFrom?: string | undefined },
  now: Date,
  rederive: Rederive,
): Promise<{ done: true }> {
  const inForceFrom = calibration.inForceFrom === undefined ? now : new Date(calibration.inForceFrom)
  return checkedWrite(
    who.personId,
    (trx) => requireFitted(trx, loggerId, 'changeSettings', now),
    async (trx, { systemId, vesselId }) => {
      const { vacuumOffsetPa, vacuumGain } = calibration
      const done = { doneBy: who.personId, doneAt: now }
      await insertCalibration(trx, { loggerId, inForceFrom, vacuumOffsetPa, vacuumGain, ...done })
      await noteAudit(trx, {
        at: now,
        personId: who.personId,
        vesselId,
        action: 'logger.calibrated',
        detail: { loggerId, ...calibration },
      })
      await rederive(trx, systemId, inForceFrom)
      return { done: true }
    },
  )
}

/** Asks for a finer rhythm while somebody watches; the logger hears of it at its next upload. */
export async function watchLogger(
  who: Who,
  loggerId: string,
  watch: { intervalSeconds: number; minutes: number },
  now: Date,
): Promise<{ intervalSeconds: number; until: string }> {
  const until = new Date(now.getTime() + watch.minutes * 60_000)
  return checkedWrite(
    who.personId,
    (trx) => requireFitted(trx, loggerId, 'fullRecord', now),
    async (trx, { logger }) => {
      const intervalSeconds = Math.min(watch.intervalSeconds, logger.intervalSeconds)
      await askFineRhythm(trx, loggerId, intervalSeconds, until)
      return { intervalSeconds, until: until.toISOString() }
    },
  )
}
