import { decode } from 'next-auth/jwt'
import { readSession } from '@/db/queries/sessions'
import { asIngest } from '@/db/roles'
import { env } from '@/lib/env'
import type { Role, Units } from '@/shared/schemas'
import { roleSchema, unitChoiceSchema } from '@/shared/schemas'
import { DEFAULT_UNITS } from '@/shared/units'
import { sessionCookieName } from './cookie'

/** Somebody who is signed in, as of this request. */
export interface Who {
  personId: string
  sessionId: string
  name: string
  email: string
  units: Units
  memberships: { shopId: string; role: Role }[]
  ownsVessels: boolean
}

/** The person behind a session cookie's value, or null: forged, expired, signed out, or gone. */
export async function whoIs(cookieValue: string | undefined): Promise<Who | null> {
  if (cookieValue === undefined || cookieValue === '') return null
  const token = await decode({ token: cookieValue, secret: env().secret }).catch(() => null)
  const sessionId = token?.sid
  if (typeof sessionId !== 'string') return null
  const session = await asIngest((trx) => readSession(trx, sessionId, new Date()))
  if (session === null) return null
  return {
    ...session,
    units: unitsOf(session.units),
    memberships: session.memberships.map(({ shopId, role }) => ({ shopId, role: roleSchema.parse(role) })),
  }
}

/** Chosen units over the usual ones; what is stored wrongly is the usual. */
export function unitsOf(stored: Record<string, unknown>): Units {
  const parsed = unitChoiceSchema.safeParse({ ...DEFAULT_UNITS, ...stored })
  return parsed.success ? parsed.data : { ...DEFAULT_UNITS, clock: '24h' }
}

export async function sessionIsLive(sessionId: unknown): Promise<boolean> {
  if (typeof sessionId !== 'string') return false
  return (await asIngest((trx) => readSession(trx, sessionId, new Date()))) !== null
}

/** The person of a request to a route handler. */
export function whoAsks(request: Request): Promise<Who | null> {
  return whoIs(cookieOf(request.headers.get('cookie'), sessionCookieName()))
}

function cookieOf(header: string | null, name: string): string | undefined {
  const entry = (header ?? '').split(';').find((pair) => pair.trimStart().startsWith(`${name}=`))
  const value = entry?.slice(entry.indexOf('=') + 1).trim()
  try {
    return value === undefined ? undefined : decodeURIComponent(value)
  } catch {
    return undefined
  }
}
