import { readCredentials, type Credentials } from '@/db/queries/people'
import { endSession, openSession } from '@/db/queries/sessions'
import { asIngest } from '@/db/roles'
import { takeCode } from '@/lib/account/codes'
import { passwordMatches } from './passwords'
import { countCode, forgiveCode, forgiveTry } from './throttle'

export const SESSION_SECONDS = 30 * 86_400

export interface SignedIn {
  personId: string
  sessionId: string
  name: string
  email: string
}

/** The password is right; a code is asked for, or the one given did not fit. */
export type CodeWanted = 'SecondFactor' | 'SecondFactorWrong'

/**
 * Opens a session for the right password, and the code where the second factor is on; null for anything else, after
 * the same time.
 */
export async function signIn(attempt: {
  email: string
  password: string
  /** Six digits from the device, or a recovery code. */
  code: string
  from: string
  userAgent: string | null
  at: Date
}): Promise<SignedIn | CodeWanted | null> {
  const email = attempt.email.trim()
  const known = await asIngest((trx) => readCredentials(trx, email))
  // An endless password would only cost time; none that long was ever set.
  const password = attempt.password.slice(0, 1000)
  if (!(await passwordMatches(known?.passwordHash ?? null, password)) || known === null) return null
  const wanted = await codeWanted(known, attempt.code.slice(0, 100), attempt.at)
  if (wanted !== null) return wanted
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

async function codeWanted(known: Credentials, code: string, at: Date): Promise<CodeWanted | null> {
  if (!known.secondFactor) return null
  if (code.trim() === '') return 'SecondFactor'
  // A known password makes six digits worth guessing: their tries are counted apart.
  await countCode(known.personId)
  if (!(await asIngest((trx) => takeCode(trx, known.personId, code, at)))) return 'SecondFactorWrong'
  await forgiveCode(known.personId)
  return null
}

export async function signOut(sessionId: string, at: Date): Promise<void> {
  await asIngest((trx) => endSession(trx, sessionId, at))
}
