import { asIngest } from '@/db/roles'
import { receiveReceipt } from '@/lib/messages/receive-receipt'
import { receiveText } from '@/lib/messages/receive-text'
import { signedForm } from '@/lib/messages/signed-form'
import { Problem } from '@/lib/problem'

/** A status callback: which message stands in its address, what became of it in the form. */
export async function takeReceipt(request: Request, now: Date): Promise<Response> {
  const { fields, query } = await signedForm(request)
  const receipt = {
    messageId: query.get('message') ?? '',
    serviceId: fields.MessageSid ?? fields.SmsSid ?? '',
    status: fields.MessageStatus ?? fields.SmsStatus ?? '',
    errorCode: fields.ErrorCode ?? null,
  }
  if (!(await asIngest((trx) => receiveReceipt(trx, receipt, now)))) {
    throw new Problem('not-found', 'There is no such message.')
  }
  return new Response(null, { status: 204 })
}

/** A reply. Our answer goes out by the queue, so that it is in the log; the service is told to say nothing itself. */
export async function takeReply(request: Request, now: Date): Promise<Response> {
  const { fields } = await signedForm(request)
  const { MessageSid: serviceId, From: from, Body: body } = fields
  if (serviceId === undefined || from === undefined) {
    throw new Problem('bad-request', 'MessageSid and From are needed.')
  }
  await asIngest((trx) => receiveText(trx, { serviceId, from, body: body ?? '' }, now))
  return new Response('<?xml version="1.0" encoding="UTF-8"?><Response></Response>', {
    headers: { 'content-type': 'text/xml' },
  })
}
