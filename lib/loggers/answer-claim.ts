import { approveClaim, denyClaim, lockClaimByUserCode, type ClaimRow } from '@/db/queries/claims'
import { asIngest, type Trx } from '@/db/roles'
import { checkedWrite, type Rederive } from '@/lib/access/checked-write'
import { noSuch, requireSystemRight } from '@/lib/access/require-right'
import { countGuess } from '@/lib/auth/throttle'
import type { Who } from '@/lib/auth/who'
import { Problem } from '@/lib/problem'
import type { Channel, Claim } from '@/shared/schemas'
import { shownCode, typedCode } from './authorize-device'
import { fitNewKey } from './register-logger'

/** What asks to be claimed with this code. @throws Problem `not-found`, `too-many-requests` for guessing */
export async function getClaim(who: Who, userCode: string, now: Date): Promise<Claim> {
  await countGuess('claim', who.personId)
  return asIngest(async (trx) => {
    const claim = await requireClaim(trx, userCode, now)
    return {
      userCode: shownCode(claim.userCode),
      serial: claim.serial,
      expiresAt: claim.expiresAt.toISOString(),
    }
  })
}

/** Grants the logger a key for a system; it fetches it at its next poll. */
export async function approve(
  who: Who,
  userCode: string,
  approval: { systemId: string; intervalSeconds: number; channels: Channel[] },
  now: Date,
  rederive: Rederive,
): Promise<{ loggerId: string }> {
  await countGuess('claim', who.personId)
  const { systemId, intervalSeconds, channels } = approval
  return checkedWrite(
    who.personId,
    (trx) => requireSystemRight(trx, systemId, 'registerLogger'),
    async (trx, standing) => {
      const claim = await requireClaim(trx, userCode, now)
      const input = { serial: claim.serial, intervalSeconds, channels }
      const { id } = await fitNewKey(trx, who, { systemId, standing, input, now, rederive })
      await approveClaim(trx, claim.id, { by: who.personId, systemId, loggerId: id })
      return { loggerId: id }
    },
  )
}

/** Refuses it. Whoever holds the code may. */
export async function deny(who: Who, userCode: string, now: Date): Promise<{ loggerId: null }> {
  await countGuess('claim', who.personId)
  return asIngest(async (trx) => {
    const claim = await requireClaim(trx, userCode, now)
    await denyClaim(trx, claim.id, now)
    return { loggerId: null }
  })
}

async function requireClaim(trx: Trx, userCode: string, now: Date): Promise<ClaimRow> {
  const claim = await lockClaimByUserCode(trx, typedCode(userCode))
  if (claim === null || claim.expiresAt <= now) throw noSuch('code')
  if (claim.loggerId !== null || claim.deniedAt !== null)
    throw new Problem('conflict', 'This code was answered already.')
  return claim
}
