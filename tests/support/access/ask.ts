import type { Actor } from './actors'
import { routeFor, type FoundRoute, type Method } from './discover'
import { someAddress, type Asked } from './requests'
import type { World } from './world'

export interface Answered {
  status: number
  location: string | null
  text: string
  headers: Headers
}
export type Asker = (method: Method, asked: Asked, cookie: string) => Promise<Answered>

export const cookieOf = (world: World, actor: Actor): string =>
  actor === 'nobody' ? '' : world.people[actor].cookie

function requestOf(base: string, method: Method, asked: Asked, cookie: string): Request {
  const type = asked.form === true ? 'application/x-www-form-urlencoded' : 'application/json'
  const body =
    asked.body === undefined || method === 'GET'
      ? null
      : asked.form === true
        ? new URLSearchParams(asked.body as Record<string, string>).toString() // forms are flat
        : JSON.stringify(asked.body)
  return new Request(new URL(asked.path, base), {
    method,
    redirect: 'manual',
    headers: {
      'x-forwarded-for': someAddress(),
      ...(cookie === '' ? {} : { cookie }),
      ...(body === null ? {} : { 'content-type': type }),
      ...asked.headers,
    },
    body,
  })
}

const answered = async (response: Response): Promise<Answered> => ({
  status: response.status,
  location: response.headers.get('location'),
  text: await response.text(),
  headers: response.headers,
})

/** Over HTTP, as the world asks. */
export const askingServer =
  (base: string): Asker =>
  async (method, asked, cookie) =>
    answered(await fetch(requestOf(base, method, asked, cookie)))

/** In this process, so that a test may change what the handlers rely on. */
export const askingHandlers =
  (routes: readonly FoundRoute[]): Asker =>
  async (method, asked, cookie) => {
    const request = requestOf('http://127.0.0.1', method, asked, cookie)
    const match = routeFor(routes, new URL(request.url).pathname)
    const handler = match?.route.handlers[method]
    if (match === null || handler === undefined) throw new Error(`nothing answers ${method} ${asked.path}`)
    return answered(await handler(request, { params: Promise.resolve(match.params) }))
  }
