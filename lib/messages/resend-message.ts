import { reviveMessage } from '@/db/queries/message-sending'
import type { Trx } from '@/db/roles'
import { enqueue } from '@/lib/messages/queue'

/**
 * Sends a message again that was given up (a manager's verb).
 * @param trx under the service's role, after the caller has checked that this person may.
 * @returns false when the message has not failed.
 */
export async function resendMessage(trx: Trx, messageId: string, now: Date): Promise<boolean> {
  if (!(await reviveMessage(trx, messageId, now))) return false
  await enqueue(trx, messageId, now)
  return true
}
