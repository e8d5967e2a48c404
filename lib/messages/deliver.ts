import { asIngest, type Trx } from '@/db/roles'
import {
  forgetBody,
  lockMessage,
  messageExists,
  noteAttempt,
  receiptOf,
  setAccepted,
  setFailed,
  type OutgoingMessage,
} from '@/db/queries/message-sending'
import { isStopped, stopAddress } from '@/db/queries/recipients'
import { SendError, type Services } from '@/lib/messages/services'
import { env } from '@/lib/env'

/** Why a message was sent, or not. */
export type DeliveryReason =
  | 'accepted'
  | 'receipt-was-there'
  | 'already-accepted'
  | 'given-up-before'
  | 'taken-back'
  | 'night-is-over'
  | 'stopped-by-receiver'
  | 'refused-for-good'
  | 'gone'

/** Another worker has the message in hand; the queue asks again. */
export class MessageBusy extends Error {}

/**
 * Sends one message, if it is still to be sent: once the service has accepted it that is written down, and only
 * then. Killed in between, the next try sends again, unless a receipt has come by then.
 * @throws SendError when the service may take it later, MessageBusy when another worker holds it.
 */
export async function deliver(messageId: string, now: Date, services: Services): Promise<DeliveryReason> {
  try {
    return await asIngest(async (trx) => {
      const message = await lockMessage(trx, messageId)
      if (message === null) {
        if (await messageExists(trx, messageId)) throw new MessageBusy()
        return 'gone'
      }
      return (await reasonNotToSend(trx, message, now)) ?? sendNow(trx, message, now, services)
    })
  } catch (error) {
    // Written in a transaction of its own: the one above is gone with the failure.
    if (error instanceof SendError) {
      await asIngest((trx) => noteAttempt(trx, messageId, now, 'failed', error.message))
    }
    throw error
  }
}

async function reasonNotToSend(
  trx: Trx,
  message: OutgoingMessage,
  now: Date,
): Promise<DeliveryReason | null> {
  if (message.acceptedAt !== null) return 'already-accepted'
  if (message.cancelledAt !== null) return 'taken-back'
  if (message.failedAt !== null) return 'given-up-before'
  const receipt = await receiptOf(trx, message.id)
  if (receipt !== null) {
    await setAccepted(trx, message.id, receipt.at, null)
    return 'receipt-was-there'
  }
  if (message.usefulUntil !== null && now > message.usefulUntil) {
    await setFailed(trx, message.id, now, 'not sent in time: the night it tells of is over')
    return 'night-is-over'
  }
  if (
    message.channel === 'sms' &&
    message.purpose !== 'reply' &&
    (await isStopped(trx, 'sms', message.address))
  ) {
    await setFailed(trx, message.id, now, 'not sent: this number has answered STOP')
    return 'stopped-by-receiver'
  }
  return null
}

async function sendNow(
  trx: Trx,
  message: OutgoingMessage,
  now: Date,
  services: Services,
): Promise<DeliveryReason> {
  try {
    const serviceId = await handOver(message, services)
    await setAccepted(trx, message.id, now, serviceId)
    await noteAttempt(trx, message.id, now, 'accepted', serviceId)
    await forgetSecrets(trx, message)
    return 'accepted'
  } catch (error) {
    if (!(error instanceof SendError) || !error.lasting) throw error
    if (error.stopped) await stopAddress(trx, 'sms', message.address, now)
    await setFailed(trx, message.id, now, error.message)
    await noteAttempt(trx, message.id, now, 'refused', error.message)
    await forgetSecrets(trx, message)
    return 'refused-for-good'
  }
}

/**
 * Mails of the account carry one-time links and codes, of which the database keeps hashes alone: once sent, or given
 * up, their text goes. The demo's and the tests' outbox reads it, and has no mailbox beside it.
 */
async function forgetSecrets(trx: Trx, message: OutgoingMessage): Promise<void> {
  if (message.purpose === 'account' && env().mode === 'production') await forgetBody(trx, message.id)
}

function handOver(message: OutgoingMessage, services: Services): Promise<string> {
  if (message.channel === 'email') {
    return services.sendMail({
      to: message.address,
      subject: message.subject ?? '',
      text: message.bodyText,
      html: message.bodyHtml,
      messageId: `message-${message.id}@${new URL(env().appUrl).hostname}`,
      attachments: message.attachments,
    })
  }
  return services.sendText({
    to: message.address,
    body: message.bodyText,
    statusCallback: `${env().appUrl}/api/sms/status?message=${message.id}`,
  })
}
