import { env } from '@/lib/env'

/** As next-auth names it: the prefix binds the cookie to https where there is https. */
export const sessionCookieName = (): string =>
  env().appUrl.startsWith('https://') ? '__Secure-next-auth.session-token' : 'next-auth.session-token'
