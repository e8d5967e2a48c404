import { Problem, problemResponse } from '@/lib/problem'
import { withHeaders } from './handle'

const METHODS = ['GET', 'POST', 'PUT', 'PATCH', 'DELETE'] as const
type MethodName = (typeof METHODS)[number]
type RouteContext = { params: Promise<Record<string, string | string[] | undefined>> }
export type RouteHandler = (request: Request, context: RouteContext) => Promise<Response>

/**
 * The handlers of one address, completed by refusals that say which methods it takes.
 * @example export const { GET, POST, PUT, PATCH, DELETE } = methods({ GET: handle(…) })
 */
export function methods(
  handlers: Partial<Record<MethodName, RouteHandler>>,
): Record<MethodName, RouteHandler> {
  const taken = METHODS.filter((name) => handlers[name] !== undefined)
  const allow = [...(taken.includes('GET') ? [...taken, 'HEAD'] : taken), 'OPTIONS'].join(', ')
  const refuse = (): Promise<Response> =>
    Promise.resolve(
      withHeaders(
        problemResponse(new Problem('wrong-method', `Use ${taken.join(' or ')}.`, { headers: { allow } })),
      ),
    )
  return {
    GET: handlers.GET ?? refuse,
    POST: handlers.POST ?? refuse,
    PUT: handlers.PUT ?? refuse,
    PATCH: handlers.PATCH ?? refuse,
    DELETE: handlers.DELETE ?? refuse,
  }
}
