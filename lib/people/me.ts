import { noteAudit } from '@/db/queries/audit'
import { changePerson, readCredentialsById, readOwnPlaces, setPasswordHash } from '@/db/queries/people'
import { endOtherSessions } from '@/db/queries/sessions'
import { listAllShops } from '@/db/queries/vessels'
import { asIngest, asPerson } from '@/db/roles'
import { hashPassword, passwordMatches } from '@/lib/auth/passwords'
import { countCode } from '@/lib/auth/throttle'
import { unitsOf, type Who } from '@/lib/auth/who'
import { queueMail } from '@/lib/messages/queue-mail'
import { Problem } from '@/lib/problem'
import { roleSchema, type Me, type Shop, type Units } from '@/shared/schemas'

/** Who is signed in, with all that decides what they are offered. */
export async function getMe(who: Who): Promise<Me> {
  const { shops, ownVessels } = await asPerson(who.personId, (trx) => readOwnPlaces(trx, who.personId))
  const inShops = roleSchema.options.filter((role) => who.memberships.some((entry) => entry.role === role))
  return {
    person: { id: who.personId, name: who.name, email: who.email },
    roles: who.ownsVessels ? ['owner', ...inShops] : inShops,
    shops: shops.map((shop) => ({ ...shop, roles: shop.roles.map((role) => roleSchema.parse(role)) })),
    ownVessels,
    units: who.units,
  }
}

export async function changeMe(
  who: Who,
  change: {
    name?: string | undefined
    units?: { [Unit in keyof Units]?: Units[Unit] | undefined } | undefined
  },
): Promise<Me> {
  const units = change.units === undefined ? undefined : unitsOf({ ...who.units, ...change.units })
  await asPerson(who.personId, (trx) => changePerson(trx, who.personId, { name: change.name, units }))
  return getMe({ ...who, name: change.name ?? who.name, units: units ?? who.units })
}

/**
 * Sets a new password: every other session ends, and the mailbox is told.
 * @throws Problem `invalid` when the current password isn't right, `too-many-requests` after too many tries
 */
export async function changePassword(
  who: Who,
  change: { current: string; next: string },
  now: Date,
): Promise<{ done: true }> {
  // A session left open in other hands must not serve for finding the password out.
  await countCode(`password ${who.personId}`)
  const known = await asIngest((trx) => readCredentialsById(trx, who.personId))
  if (!(await passwordMatches(known?.passwordHash ?? null, change.current)))
    throw new Problem('invalid', 'The current password is not right.', {
      extensions: { errors: [{ path: 'current', message: 'is not right' }] },
    })
  const passwordHash = await hashPassword(change.next)
  await asIngest(async (trx) => {
    await setPasswordHash(trx, who.personId, passwordHash)
    await endOtherSessions(trx, who.personId, who.sessionId, now)
    await noteAudit(trx, { at: now, personId: who.personId, action: 'account.password' })
    const mail = {
      personId: who.personId,
      to: who.email,
      subject: 'Your password was changed',
      paragraphs: [
        'A new password was chosen under Account, and every other device was signed out. If that was not you, have a new password sent from the sign-in page at once.',
      ],
      purpose: 'account' as const,
    }
    await queueMail(trx, mail, now)
  })
  return { done: true }
}

/** Names and harbours of all shops, for an owner to choose whom to let in. Nothing else of them is told. */
export async function listShops(): Promise<{ items: Shop[]; next: null }> {
  return { items: await asIngest(listAllShops), next: null }
}
