import { createHmac } from 'node:crypto'

/**
 * The signature a hosted SMS service puts on its webhooks (its published scheme): HMAC-SHA1, keyed by the
 * account's token, of the full address followed by every form field's name and value in order of name; base64.
 */
export function webhookSignature(authToken: string, url: string, fields: Record<string, string>): string {
  const text = Object.keys(fields)
    .sort()
    .reduce((sum, name) => sum + name + (fields[name] ?? ''), url)
  return createHmac('sha1', authToken).update(text, 'utf8').digest('base64')
}

/** Posts a signed form to a webhook, as the service does. Resolves with the HTTP status, 0 if nobody answered. */
export async function postSigned(
  authToken: string,
  url: string,
  fields: Record<string, string>,
): Promise<number> {
  try {
    const answer = await fetch(url, {
      method: 'POST',
      headers: {
        'content-type': 'application/x-www-form-urlencoded; charset=UTF-8',
        'x-twilio-signature': webhookSignature(authToken, url, fields),
      },
      body: new URLSearchParams(fields),
      signal: AbortSignal.timeout(10_000),
    })
    await answer.arrayBuffer()
    return answer.status
  } catch {
    return 0
  }
}
