import { env } from '@/lib/env'
import { Problem } from '@/lib/problem'

const MAX_BODY_BYTES = 1_048_576

/**
 * Refuses a write that a page of another site could have sent: `Origin`, if there is one, must be ours.
 * @throws Problem `wrong-origin`
 */
export function requireOwnOrigin(request: Request): void {
  const origin = request.headers.get('origin')
  if (origin === null) return
  const host = request.headers.get('host')
  const own = new URL(env().appUrl).origin
  const protocol = own.startsWith('https:') ? 'https' : 'http'
  if (origin === own || (host !== null && origin === `${protocol}://${host}`)) return
  throw new Problem('wrong-origin', 'Send this from Middlewatch’s own pages, or without an Origin header.')
}

/** The text of a body up to a mebibyte, stopped while reading. @throws Problem `too-large` */
export async function readText(request: Request, limitBytes = MAX_BODY_BYTES): Promise<string> {
  const reader = request.body?.getReader()
  if (reader === undefined) return ''
  const decoder = new TextDecoder()
  let text = ''
  let bytes = 0
  for (;;) {
    const { done, value } = await reader.read()
    if (done) return text + decoder.decode()
    bytes += value.byteLength
    if (bytes > limitBytes) {
      await reader.cancel()
      throw new Problem('too-large', `Send at most ${Math.floor(limitBytes / 1024)} KiB.`)
    }
    text += decoder.decode(value, { stream: true })
  }
}

/** Nothing at all sent is an empty object. @throws Problem `wrong-media-type`, `too-large`, `not-parseable` */
export async function readJson(request: Request): Promise<unknown> {
  const type = mediaType(request)
  if (type !== 'application/json') {
    if (type === '' && (await readText(request)) === '') return {}
    throw new Problem('wrong-media-type', 'Send JSON, with content-type application/json.')
  }
  const text = await readText(request)
  try {
    return JSON.parse(text)
  } catch (error) {
    const where = error instanceof Error ? error.message : ''
    throw new Problem('not-parseable', `The body is not JSON: ${where.slice(0, 200)}.`)
  }
}

const mediaType = (request: Request): string =>
  request.headers.get('content-type')?.split(';')[0]?.trim().toLowerCase() ?? ''

/** The fields of a form, first value of each. @throws Problem `wrong-media-type`, `too-large` */
export async function readForm(request: Request): Promise<Record<string, string>> {
  if (mediaType(request) !== 'application/x-www-form-urlencoded')
    throw new Problem('wrong-media-type', 'Send a form, with content-type application/x-www-form-urlencoded.')
  const fields: Record<string, string> = {}
  for (const [name, value] of new URLSearchParams(await readText(request))) fields[name] ??= value
  return fields
}
