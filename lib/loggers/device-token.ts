import { lockClaimByDevice, loggerHeardAt, noteGranted, notePoll, type ClaimRow } from '@/db/queries/claims'
import { setKey } from '@/db/queries/loggers'
import { asIngest, type Trx } from '@/db/roles'
import { hashKey, newKey } from './key'
import { OAuthError } from './oauth'

const GRANT_TYPE = 'urn:ietf:params:oauth:grant-type:device_code'
/** RFC 8628 3.5: a logger that polls too fast waits so much longer from then on. */
const SLOWER_BY_SECONDS = 5

/**
 * RFC 8628 3.4: the logger polls for its key. Until it has been heard with the key it may ask again and gets another,
 * since the answer may be lost on the way.
 * @throws OAuthError while nobody has answered, or when there is nothing to grant
 */
export async function deviceToken(
  form: Readonly<Record<string, string>>,
  now: Date,
): Promise<{ access_token: string; token_type: 'Bearer' }> {
  const { grant_type: grantType, device_code: deviceCode, client_id: clientId } = form
  if (!grantType || !deviceCode || !clientId)
    throw new OAuthError('invalid_request', 'grant_type, device_code and client_id are needed')
  if (grantType !== GRANT_TYPE) throw new OAuthError('unsupported_grant_type', `only ${GRANT_TYPE}`)
  // Refusals are answers here: thrown within the transaction they would take back that the logger polled.
  const answer = await asIngest((trx) => poll(trx, { deviceCode, clientId, now }))
  if (answer instanceof OAuthError) throw answer
  return { access_token: answer, token_type: 'Bearer' }
}

async function poll(
  trx: Trx,
  asked: { deviceCode: string; clientId: string; now: Date },
): Promise<string | OAuthError> {
  const { now } = asked
  const claim = await lockClaimByDevice(trx, hashKey(asked.deviceCode))
  if (claim === null || claim.serial !== asked.clientId)
    return new OAuthError('invalid_grant', 'no such device_code for this client_id')
  if (claim.deniedAt !== null) return new OAuthError('access_denied', 'the claim was refused')
  if (claim.expiresAt <= now) return new OAuthError('expired_token', 'ask for a new code')
  if (tooSoon(claim, now)) {
    const intervalSeconds = claim.intervalSeconds + SLOWER_BY_SECONDS
    await notePoll(trx, claim.id, now, intervalSeconds)
    return new OAuthError('slow_down', `poll every ${intervalSeconds} seconds`)
  }
  await notePoll(trx, claim.id, now, claim.intervalSeconds)
  if (claim.loggerId === null) return new OAuthError('authorization_pending', 'nobody has answered yet')
  if (claim.grantedAt !== null) {
    const heardAt = await loggerHeardAt(trx, claim.loggerId)
    if (heardAt !== null && heardAt >= claim.grantedAt)
      return new OAuthError('invalid_grant', 'the key was fetched and used already')
  }
  const key = newKey()
  await setKey(trx, claim.loggerId, hashKey(key), now)
  await noteGranted(trx, claim.id, now)
  return key
}

/** A tenth of a second of grace for what the network does to an exact rhythm. */
const tooSoon = (claim: ClaimRow, now: Date): boolean =>
  claim.lastPolledAt !== null &&
  now.getTime() - claim.lastPolledAt.getTime() < claim.intervalSeconds * 1000 - 100
