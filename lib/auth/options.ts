import type { AuthOptions } from 'next-auth'
import CredentialsProvider from 'next-auth/providers/credentials'
import { env } from '@/lib/env'
import { log } from '@/lib/log'
import { addressOf } from './address'
import { sessionCookieName } from './cookie'
import { SESSION_SECONDS, signIn, signOut } from './sign-in'
import { sessionIsLive } from './who'

const text = (value: unknown): string => (typeof value === 'string' ? value : '')

/** next-auth's part: the credentials flow and the cookie. Who somebody is is read from the session row, not from here. */
export function authOptions(): AuthOptions {
  return {
    secret: env().secret,
    session: { strategy: 'jwt', maxAge: SESSION_SECONDS },
    useSecureCookies: env().appUrl.startsWith('https://'),
    cookies: {
      sessionToken: {
        name: sessionCookieName(),
        options: {
          httpOnly: true,
          sameSite: 'lax',
          path: '/',
          secure: env().appUrl.startsWith('https://'),
        },
      },
    },
    pages: { signIn: '/sign-in', error: '/sign-in' },
    providers: [
      CredentialsProvider({
        name: 'password',
        credentials: {
          email: { label: 'E-mail', type: 'email' },
          password: { type: 'password' },
          code: { type: 'text' },
        },
        authorize: async (credentials, request) => {
          const headers = new Headers(request.headers)
          const outcome = await signIn({
            email: text(credentials?.email),
            password: text(credentials?.password),
            code: text(credentials?.code),
            from: addressOf(headers),
            userAgent: headers.get('user-agent'),
            at: new Date(),
          }).catch((error: unknown) => {
            // The text of an error thrown here would end up in a redirect's address.
            log.error({ err: error }, 'sign-in failed')
            return null
          })
          if (outcome === null) return null
          // Thrown on purpose: so the form learns, by the address it is answered with, that a code is wanted.
          if (typeof outcome === 'string') throw new Error(outcome)
          const { personId: id, name, email, sessionId } = outcome
          return { id, name, email, sessionId }
        },
      }),
    ],
    callbacks: {
      jwt: async ({ token, user }) => {
        if (user !== undefined && 'sessionId' in user) return { ...token, sid: user.sessionId }
        if (!(await sessionIsLive(token.sid))) throw new Error('the session has ended')
        return token
      },
    },
    events: {
      signOut: async ({ token }) => {
        if (typeof token?.sid === 'string') await signOut(token.sid, new Date())
      },
    },
    logger: {
      error: (code) => log.debug({ code }, 'next-auth'),
      warn: (code) => log.debug({ code }, 'next-auth'),
      debug: () => {},
    },
  }
}
