import { readCredentials } from '@/db/queries/people'
import { endSession, openSession } from '@/db/queries/sessions'
import { asIngest } from '@/db/roles'
import { passwordMatches } from './passwords'
import { forgiveTry } from './throttle'

export const SESSION_SECONDS = 30 * 86_400

export interface SignedIn {
  personId: string
  sessionId: string
  name: string
  email: string
}

/** Opens a session for the right password; null for anything else, after the same time. */
export async function signIn(attempt: {
  email: string
  password: string
  from: string
  userAgent: string | null
  at: Date
}): Promise<SignedIn | null> {
  const email = attempt.email.trim()
  const known = await asIngest((trx) => readCredentials(trx, email))
  // An endless password would only cost time; none that long was ever set.
  const password = attempt.password.slice(0, 1000)
  if (!(await passwordMatches(known?.passwordHash ?? null, password)) || known === null) return null
  await forgiveTry(email, attempt.from)
  const sessionId = await asIngest((trx) =>
    openSession(trx, {
      personId: known.personId,
      at: attempt.at,
      expiresAt: new Date(attempt.at.getTime() + SESSION_SECONDS * 1000),
      userAgent: attempt.userAgent,
    }),
  )
  return { personId: known.personId, sessionId, name: known.name, email: known.email }
}

export async function signOut(sessionId: string, at: Date): Promise<void> {
  await asIngest((trx) => endSession(trx, sessionId, at))
}
