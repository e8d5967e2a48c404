import { noteAudit } from '@/db/queries/audit'
import { anonymise, closeShop, eraseRecord, readDeletion } from '@/db/queries/deletion'
import { lockShop } from '@/db/queries/joining'
import { asIngest } from '@/db/roles'
import type { Who } from '@/lib/auth/who'
import { queueMail } from '@/lib/messages/queue-mail'
import { Problem } from '@/lib/problem'
import type { Deletion } from '@/shared/schemas'
import { requirePassword } from './require-password'

/** What would go with the account and what would stay, to read before deciding. */
export function previewDeletion(who: Who): Promise<Deletion> {
  return asIngest((trx) => readDeletion(trx, who.personId))
}

/**
 * Ends the account: the person is anonymised, memberships and ownership end, the record of vessels that nobody else
 * owns is erased. Shops keep the visits they did.
 * @throws Problem `invalid` when the address typed or the password isn't right, `conflict` for the last manager
 */
export async function deleteAccount(
  who: Who,
  input: { email: string; password: string },
  now: Date,
): Promise<{ done: true }> {
  if (input.email.trim().toLowerCase() !== who.email.toLowerCase())
    throw new Problem('invalid', 'Type the address of your account to say that you mean it.', {
      extensions: { errors: [{ path: 'email', message: 'is not the address of this account' }] },
    })
  await requirePassword(who, input.password)
  const { personId } = who
  return asIngest(async (trx) => {
    for (const shopId of [...new Set(who.memberships.map((entry) => entry.shopId))].sort())
      await lockShop(trx, shopId)
    const { vessels, blocked, closing } = await readDeletion(trx, personId)
    const [shop] = blocked
    if (shop !== undefined)
      throw new Problem('conflict', `You are the last manager of ${shop.name}: make somebody else one first.`)
    for (const { id } of vessels) {
      await eraseRecord(trx, id, now)
      await noteAudit(trx, { at: now, personId, vesselId: id, action: 'vessel.erased' })
    }
    for (const { id } of closing) {
      await closeShop(trx, id, now)
      await noteAudit(trx, { at: now, personId, shopId: id, action: 'shop.closed' })
    }
    await anonymise(trx, personId, now)
    await noteAudit(trx, { at: now, personId, action: 'account.deleted' })
    await queueMail(
      trx,
      {
        personId: null,
        to: who.email,
        subject: 'Your account is gone',
        paragraphs: [
          'Your Middlewatch account and what it held of you were deleted, as you asked. This is the last mail to this address.',
        ],
        purpose: 'account',
      },
      now,
    )
    return { done: true as const }
  })
}
