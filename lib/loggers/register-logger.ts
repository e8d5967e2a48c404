import { readStandingOfSystem, type Standing } from '@/db/queries/access'
import { noteAudit } from '@/db/queries/audit'
import {
  endFittings,
  fit,
  insertLogger,
  lockLoggerBySerial,
  registerAgain,
  type KnownLogger,
  type LoggerKeyed,
} from '@/db/queries/loggers'
import { asPerson, type Trx } from '@/db/roles'
import { checkedWrite, type Rederive } from '@/lib/access/checked-write'
import { requireSystemRight } from '@/lib/access/require-right'
import { rightsOf } from '@/lib/access/rights'
import type { Who } from '@/lib/auth/who'
import { Problem } from '@/lib/problem'
import type { LoggerKey, RegisterLogger } from '@/shared/schemas'
import { hashKey, newKey } from './key'

/**
 * Registers a logger and fits it to a system. What was fitted there before ends at that moment; a logger known
 * already is moved with a new key, if the person may take it from where it is.
 * @returns its id and its key, which is shown this once
 * @throws Problem `not-found`, `not-allowed`, `conflict` for a serial that belongs to somebody else
 */
export async function registerLogger(
  who: Who,
  systemId: string,
  input: RegisterLogger,
  now: Date,
  rederive: Rederive,
): Promise<LoggerKey> {
  return checkedWrite(
    who.personId,
    (trx) => requireSystemRight(trx, systemId, 'registerLogger'),
    (trx, standing) => fitNewKey(trx, who, { systemId, standing, input, now, rederive }),
  )
}

export interface Fitting {
  systemId: string
  standing: Standing
  input: RegisterLogger
  now: Date
  rederive: Rederive
}

/** The writing part of it, also used when a claim is granted. */
export async function fitNewKey(trx: Trx, who: Who, fitting: Fitting): Promise<LoggerKey> {
  const { systemId, standing, input, now, rederive } = fitting
  const key = newKey()
  const keyed: LoggerKeyed = {
    serial: input.serial,
    shopId: shopOf(who),
    intervalSeconds: input.intervalSeconds,
    channels: input.channels,
    keyHash: hashKey(key),
    keyMadeAt: now,
  }
  const known = await lockLoggerBySerial(trx, input.serial)
  if (known !== null) await requireTaking(who, known)
  const id = known?.id ?? (await insertLogger(trx, keyed))
  if (known !== null) await registerAgain(trx, id, keyed)

  const from = input.fittedAt === undefined ? null : new Date(input.fittedAt)
  const left = await endFittings(trx, { loggerId: id }, from ?? now)
  const replaced = await endFittings(trx, { systemId }, from ?? now)
  const since = await fit(trx, { loggerId: id, systemId, from, fittedBy: who.personId })
  await noteAudit(trx, {
    at: now,
    personId: who.personId,
    vesselId: standing.vesselId,
    action: 'logger.registered',
    detail: { loggerId: id, serial: input.serial, systemId },
  })
  for (const touched of new Set([...left, ...replaced, systemId])) await rederive(trx, touched, since)
  return { id, key }
}

const shopOf = (who: Who): string | null =>
  who.memberships.find(({ role }) => role === 'installer' || role === 'manager')?.shopId ?? null

/** A logger in use is taken only by somebody with the right where it is fitted; one in stock only by its shop. */
async function requireTaking(who: Who, known: KnownLogger): Promise<void> {
  const ofOwnShop = known.shopId !== null && who.memberships.some(({ shopId }) => shopId === known.shopId)
  if (known.systemId === null) {
    if (ofOwnShop || known.shopId === null) return
  } else {
    const { systemId } = known
    const standing = await asPerson(who.personId, (trx) => readStandingOfSystem(trx, systemId))
    if (standing !== null && rightsOf(standing).registerLogger) return
  }
  throw new Problem('conflict', 'A logger with this serial is registered already: check the serial.')
}
