import { addressOf } from '@/lib/auth/address'
import { countClaim } from '@/lib/auth/throttle'
import { now } from '@/lib/env'
import { log } from '@/lib/log'
import { OAuthError, oauthAnswer, oauthRefusal } from '@/lib/loggers/oauth'
import { answering, Problem } from '@/lib/problem'
import { readForm } from './read-body'

/** The ritual of the two OAuth addresses: a form in, JSON out, refusals as RFC 6749 5.2 has them. */
export function handleOAuth(
  what: string,
  call: (form: Record<string, string>, now: Date) => Promise<object>,
  { limited = false }: { limited?: boolean } = {},
): (request: Request) => Promise<Response> {
  return (request) =>
    answering(
      async () => {
        try {
          if (limited) await countClaim(addressOf(request.headers))
          return oauthAnswer(await call(await readForm(request), now(request)))
        } catch (error) {
          if (error instanceof OAuthError) return oauthRefusal(error)
          // A body that is no form is a malformed request in OAuth's words.
          if (error instanceof Problem && (error.status === 415 || error.status === 413))
            return oauthRefusal(new OAuthError('invalid_request', error.message))
          throw error
        }
      },
      (error) => log.error({ err: error, what }, 'request failed'),
    )
}
