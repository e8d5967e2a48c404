import { endOwnSession, readSessions } from '@/db/queries/account'
import { endOtherSessions } from '@/db/queries/sessions'
import { asIngest } from '@/db/roles'
import { noSuch } from '@/lib/access/require-right'
import type { Who } from '@/lib/auth/who'
import type { List, Session } from '@/shared/schemas'

/** Where one is signed in. */
export async function listSessions(who: Who, now: Date): Promise<List<Session>> {
  const rows = await asIngest((trx) => readSessions(trx, who.personId, now))
  const items = rows.map((row) => ({
    id: row.id,
    current: row.id === who.sessionId,
    createdAt: row.createdAt.toISOString(),
    lastSeenAt: row.lastSeenAt.toISOString(),
    userAgent: row.userAgent,
  }))
  return { items: items.sort((a, b) => Number(b.current) - Number(a.current)), next: null }
}

/** Signs one device out, at once. @throws Problem `not-found` for one that is not one's own */
export async function endSession(who: Who, id: string, now: Date): Promise<{ done: true }> {
  if (!(await asIngest((trx) => endOwnSession(trx, who.personId, id, now)))) throw noSuch('session')
  return { done: true }
}

/** Signs every device out but this one. */
export async function endOthers(who: Who, now: Date): Promise<{ done: true }> {
  await asIngest((trx) => endOtherSessions(trx, who.personId, who.sessionId, now))
  return { done: true }
}
