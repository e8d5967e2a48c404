import { inject } from 'vitest'
import { DEMO_PASSWORD } from './settings'

/** Somebody's view of the running server: their cookie goes along with every request. */
export interface Client {
  cookie: string
  get<T = unknown>(path: string, headers?: Record<string, string>): Promise<Answer<T>>
  send<T = unknown>(
    method: string,
    path: string,
    body?: unknown,
    headers?: Record<string, string>,
  ): Promise<Answer<T>>
}

export interface Answer<T> {
  status: number
  headers: Headers
  body: T
}

/** The address of the server under test. */
export const serverUrl = (): string => inject('settings').url

/** A client that nobody is signed in to. */
export function nobody(): Client {
  return clientWith('')
}

/** Signs in through the credentials flow, as a browser does. @throws Error when the sign-in is refused. */
export async function signIn(email: string, password = DEMO_PASSWORD): Promise<Client> {
  const csrf = await fetch(`${serverUrl()}/api/auth/csrf`)
  const { csrfToken } = (await csrf.json()) as { csrfToken: string }
  const answer = await fetch(`${serverUrl()}/api/auth/callback/credentials`, {
    method: 'POST',
    redirect: 'manual',
    headers: { 'content-type': 'application/x-www-form-urlencoded', cookie: cookiesOf(csrf) },
    body: new URLSearchParams({ email, password, csrfToken, json: 'true' }),
  })
  if (answer.status !== 200) throw new Error(`signing in as ${email} was answered ${answer.status}`)
  return clientWith(cookiesOf(answer))
}

function clientWith(cookie: string): Client {
  const ask = async <T>(
    method: string,
    path: string,
    body: unknown,
    headers: Record<string, string>,
  ): Promise<Answer<T>> => {
    const answer = await fetch(`${serverUrl()}${path}`, {
      method,
      redirect: 'manual',
      headers: {
        ...(cookie ? { cookie } : {}),
        ...(body === undefined ? {} : { 'content-type': 'application/json' }),
        ...headers,
      },
      ...(body === undefined ? {} : { body: JSON.stringify(body) }),
    })
    const text = await answer.text()
    const json = answer.headers.get('content-type')?.includes('json') ?? false
    return { status: answer.status, headers: answer.headers, body: (json ? JSON.parse(text) : text) as T }
  }
  return {
    cookie,
    get: (path, headers = {}) => ask('GET', path, undefined, headers),
    send: (method, path, body, headers = {}) => ask(method, path, body, headers),
  }
}

function cookiesOf(answer: Response): string {
  return answer.headers
    .getSetCookie()
    .map((line) => line.split(';')[0])
    .join('; ')
}
