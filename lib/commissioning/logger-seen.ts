import { asPerson } from '@/db/roles'
import type { Who } from '@/lib/auth/who'
import { requireLoggerSeen } from '@/lib/loggers/require-logger'
import { Problem } from '@/lib/problem'

/** Whether the person may see this logger: of their shop, or on a system they see. */
export async function loggerSeen(who: Who, loggerId: string, now: Date): Promise<boolean> {
  try {
    await asPerson(who.personId, (trx) => requireLoggerSeen(trx, loggerId, now))
    return true
  } catch (error) {
    if (error instanceof Problem && error.status === 404) return false
    throw error
  }
}
