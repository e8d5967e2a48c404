import twilio from 'twilio'
import { env } from '@/lib/env'
import { Problem } from '@/lib/problem'

const MOST_BYTES = 16_384

/**
 * The fields of a form that the text service has signed, with the query of its address beside them.
 * @throws Problem `not-found` when texts are not set up, `not-allowed` when the signature is not the service's.
 */
export async function signedForm(
  request: Request,
): Promise<{ fields: Record<string, string>; query: URLSearchParams }> {
  const { sms, appUrl } = env()
  if (sms.authToken === undefined) throw new Problem('not-found', 'Texts are not set up here.')
  const text = await request.text()
  if (text.length > MOST_BYTES) throw new Problem('too-large', 'A form of the text service is small.')
  const { pathname, search, searchParams } = new URL(request.url)
  const fields = Object.fromEntries(new URLSearchParams(text))
  const signature = request.headers.get('x-twilio-signature') ?? ''
  // Signed is the address that the service was given, not the one that a proxy made of it.
  if (!twilio.validateRequest(sms.authToken, signature, `${appUrl}${pathname}${search}`, fields)) {
    throw new Problem('not-allowed', 'The signature is not that of the text service.')
  }
  return { fields, query: searchParams }
}
