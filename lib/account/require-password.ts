import { readCredentialsById } from '@/db/queries/people'
import { asIngest } from '@/db/roles'
import { passwordMatches } from '@/lib/auth/passwords'
import { countCode, forgiveCode } from '@/lib/auth/throttle'
import type { Who } from '@/lib/auth/who'
import { Problem } from '@/lib/problem'

/** Asks for the password again before what an unlocked phone in other hands must not do. @throws Problem */
export async function requirePassword(who: Who, password: string): Promise<void> {
  await countCode(`password ${who.personId}`)
  const known = await asIngest((trx) => readCredentialsById(trx, who.personId))
  if (await passwordMatches(known?.passwordHash ?? null, password))
    return forgiveCode(`password ${who.personId}`)
  throw new Problem('invalid', 'The password is not right.', {
    extensions: { errors: [{ path: 'password', message: 'is not right' }] },
  })
}
