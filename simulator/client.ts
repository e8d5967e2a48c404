import { setTimeout as pause } from 'node:timers/promises'
import { z } from 'zod'

/** An answer outside 2xx. */
export class ApiError extends Error {
  constructor(
    readonly status: number,
    readonly path: string,
    detail: string,
  ) {
    super(`${path} answered ${status}: ${detail}`)
  }
}

/** A person's session with the public API, as a browser would hold it. */
export type Session = {
  send: <T extends z.ZodType>(method: string, path: string, body: unknown, schema: T) => Promise<z.infer<T>>
  get: <T extends z.ZodType>(path: string, schema: T) => Promise<z.infer<T>>
}

const TRY_AGAIN = new Set([429, 502, 503, 504])

/** Signs in by the credentials flow: token, form, cookie. @throws ApiError when refused. */
export async function signIn(
  url: string,
  email: string,
  password: string,
  signal?: AbortSignal,
): Promise<Session> {
  const jar = new Map<string, string>()
  const request = async (path: string, init: RequestInit): Promise<Response> => {
    const headers = new Headers(init.headers)
    headers.set('cookie', [...jar].map(([name, value]) => `${name}=${value}`).join('; '))
    const answer = await fetch(new URL(path, url), {
      ...init,
      headers,
      redirect: 'manual',
      signal: signal ?? null,
    })
    for (const line of answer.headers.getSetCookie()) {
      const [pair = ''] = line.split(';')
      const split = pair.indexOf('=')
      jar.set(pair.slice(0, split), pair.slice(split + 1))
    }
    return answer
  }
  const { csrfToken } = z
    .object({ csrfToken: z.string() })
    .parse(await (await request('/api/auth/csrf', {})).json())
  const signedIn = await request('/api/auth/callback/credentials', {
    method: 'POST',
    body: new URLSearchParams({ email, password, csrfToken, json: 'true' }),
  })
  if (signedIn.status !== 200 || ![...jar.keys()].some((name) => name.includes('session-token'))) {
    throw new ApiError(signedIn.status, 'signing in', email)
  }
  const call = async <T extends z.ZodType>(
    path: string,
    init: RequestInit,
    schema: T,
  ): Promise<z.infer<T>> => {
    for (let attempt = 1; ; attempt++) {
      const answer = await request(path, init)
      const text = await answer.text()
      if (answer.ok) return schema.parse(text === '' ? null : JSON.parse(text))
      if (!TRY_AGAIN.has(answer.status) || attempt >= 8)
        throw new ApiError(answer.status, path, text.slice(0, 300))
      const seconds = Number(answer.headers.get('retry-after') ?? 1)
      await pause(
        1000 * Math.min(30, Number.isFinite(seconds) ? seconds : 1),
        undefined,
        signal ? { signal } : {},
      )
    }
  }
  return {
    send: (method, path, body, schema) =>
      call(
        path,
        { method, headers: { 'content-type': 'application/json' }, body: JSON.stringify(body) },
        schema,
      ),
    get: (path, schema) => call(path, {}, schema),
  }
}

/** Waits until the server says it is ready. */
export async function waitUntilReady(url: string, signal: AbortSignal, limitMs = 300_000): Promise<void> {
  const until = Date.now() + limitMs
  for (;;) {
    const ready = await fetch(new URL('/api/health', url), { signal }).then(
      (answer) => answer.ok,
      () => false,
    )
    if (ready) return
    signal.throwIfAborted()
    if (Date.now() > until) throw new Error(`${url} did not become ready`)
    await pause(500, undefined, { signal })
  }
}
