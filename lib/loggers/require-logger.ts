import { readStandingOfSystem } from '@/db/queries/access'
import { readLoggers, type LoggerRow } from '@/db/queries/loggers'
import type { Trx } from '@/db/roles'
import { noSuch, requireSystemRight } from '@/lib/access/require-right'
import { rightsOf } from '@/lib/access/rights'
import type { Who } from '@/lib/auth/who'
import { Problem } from '@/lib/problem'

/**
 * A logger the person sees and may manage: by the right on the system it is fitted to, or, in stock, as an installer
 * or manager of its shop. @throws Problem `not-found`, `not-allowed`
 */
export async function requireLogger(trx: Trx, who: Who, loggerId: string, now: Date): Promise<LoggerRow> {
  const logger = await requireLoggerSeen(trx, loggerId, now)
  if (logger.fitted !== null) {
    const standing = await readStandingOfSystem(trx, logger.fitted.systemId)
    if (standing !== null && rightsOf(standing).registerLogger) return logger
  } else if (
    who.memberships.some(
      ({ shopId, role }) => shopId === logger.shopId && (role === 'installer' || role === 'manager'),
    )
  ) {
    return logger
  }
  throw new Problem('not-allowed', 'Loggers are managed by the owner, an installer or the shop’s manager.')
}

/** Sight alone. @throws Problem `not-found` */
export async function requireLoggerSeen(trx: Trx, loggerId: string, now: Date): Promise<LoggerRow> {
  // Ids of loggers are 32 bits wide; a longer number names none.
  if (Number(loggerId) > 2_147_483_647) throw noSuch('logger')
  const [logger] = await readLoggers(trx, { at: now, loggerId })
  if (logger === undefined) throw noSuch('logger')
  return logger
}

/** The logger must be fitted, and the right be held on its system. */
export async function requireFitted(
  trx: Trx,
  loggerId: string,
  right: 'fullRecord' | 'registerLogger' | 'changeSettings',
  now: Date,
): Promise<{ logger: LoggerRow; systemId: string; vesselId: string }> {
  const logger = await requireLoggerSeen(trx, loggerId, now)
  if (logger.fitted === null) throw new Problem('conflict', 'The logger is not fitted to a system.')
  await requireSystemRight(trx, logger.fitted.systemId, right)
  return { logger, systemId: logger.fitted.systemId, vesselId: logger.fitted.vesselId }
}
