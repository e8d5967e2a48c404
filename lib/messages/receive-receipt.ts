import {
  messageExists,
  noteAttempt,
  setAccepted,
  setDelivered,
  setFailed,
} from '@/db/queries/message-sending'
import type { Trx } from '@/db/roles'

/** What the service says became of a text. */
export interface Receipt {
  messageId: string
  serviceId: string
  status: string
  errorCode: string | null
}

const ON_THE_WAY = ['accepted', 'scheduled', 'queued', 'sending', 'sent']
const LOST = ['undelivered', 'failed', 'canceled']

/**
 * Notes a receipt. Any receipt proves that the service has the message, also when its answer to us was lost.
 * @param trx under the service's role.
 * @returns false when there is no such message or the word is not known.
 */
export async function receiveReceipt(trx: Trx, receipt: Receipt, now: Date): Promise<boolean> {
  const { messageId, serviceId, status } = receipt
  if (!/^\d{1,18}$/.test(messageId) || !(await messageExists(trx, messageId))) return false
  if (ON_THE_WAY.includes(status)) {
    await noteAttempt(trx, messageId, now, 'accepted', serviceId)
    await setAccepted(trx, messageId, now, serviceId)
    return true
  }
  if (status === 'delivered') {
    await noteAttempt(trx, messageId, now, 'delivered', serviceId)
    await setAccepted(trx, messageId, now, serviceId)
    await setDelivered(trx, messageId, now)
    return true
  }
  if (!LOST.includes(status)) return false
  const failure = `not delivered${receipt.errorCode === null ? '' : ` (service’s code ${receipt.errorCode})`}`
  await noteAttempt(trx, messageId, now, 'undelivered', failure)
  await setAccepted(trx, messageId, now, serviceId)
  await setFailed(trx, messageId, now, failure)
  return true
}
