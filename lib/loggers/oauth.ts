/** Answers of the two addresses that follow OAuth's conventions rather than this API's. */
const HEADERS = { 'cache-control': 'no-store', pragma: 'no-cache', 'x-content-type-options': 'nosniff' }

export type OAuthErrorCode =
  | 'invalid_request'
  | 'invalid_client'
  | 'invalid_grant'
  | 'unsupported_grant_type'
  | 'authorization_pending'
  | 'slow_down'
  | 'expired_token'
  | 'access_denied'

/** Refused, in the words of RFC 6749 5.2 and RFC 8628 3.5. */
export class OAuthError extends Error {
  constructor(
    readonly code: OAuthErrorCode,
    description: string,
  ) {
    super(description)
  }
}

export const oauthAnswer = (body: object): Response => Response.json(body, { headers: HEADERS })

export const oauthRefusal = (error: OAuthError): Response =>
  Response.json(
    { error: error.code, error_description: error.message },
    { status: error.code === 'invalid_client' ? 401 : 400, headers: HEADERS },
  )
