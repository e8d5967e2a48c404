import type { z } from 'zod'
import { whoAsks, type Who } from '@/lib/auth/who'
import { env, now } from '@/lib/env'
import { log } from '@/lib/log'
import { answering, Problem } from '@/lib/problem'
import type { Operation } from './operation'
import { readJson, requireOwnOrigin } from './read-body'

type Given<Schema extends z.ZodType> = z.output<Schema>

/** What a handler's one call is given; `person` is there exactly when the operation asks for a sign-in. */
export interface Asked<Person, Params, Query, Body> {
  person: Person
  params: Params
  query: Query
  body: Body
  /** The present of the request. */
  now: Date
  request: Request
}

type RouteContext = { params: Promise<Record<string, string | string[] | undefined>> }
type RouteHandler = (request: Request, context: RouteContext) => Promise<Response>

/** Answers of the API are data for one reader: never kept by a cache, never run or framed by a browser. */
const SAFE_HEADERS = {
  'cache-control': 'private, no-store',
  'x-content-type-options': 'nosniff',
  'content-security-policy': "default-src 'none'; frame-ancestors 'none'",
  'referrer-policy': 'no-referrer',
}

/**
 * The one ritual of a route handler: who is it, is the input valid, one call, answer.
 * Input and output are parsed by the operation's schemas; whatever is thrown leaves as problem details.
 */
export function handle<
  Params extends z.ZodType,
  Query extends z.ZodType,
  Body extends z.ZodType,
  Output extends z.ZodType,
>(
  operation: Operation<Params, Query, Body, Output> & { access: 'everybody' | 'demo' },
  call: (asked: Asked<null, Given<Params>, Given<Query>, Given<Body>>) => Promise<z.input<Output>>,
): RouteHandler
export function handle<
  Params extends z.ZodType,
  Query extends z.ZodType,
  Body extends z.ZodType,
  Output extends z.ZodType,
>(
  operation: Operation<Params, Query, Body, Output>,
  call: (asked: Asked<Who, Given<Params>, Given<Query>, Given<Body>>) => Promise<z.input<Output>>,
): RouteHandler
export function handle(
  operation: Operation,
  call: (asked: Asked<never, unknown, unknown, unknown>) => Promise<unknown>,
): RouteHandler {
  return async (request, context) => {
    const response = await answering(
      async () => {
        const person = await admit(operation, request)
        const asked = {
          person: person as never, // the overloads above tie its presence to `access`
          params: readParams(operation, await context.params),
          query: readQuery(operation, request),
          body: await readInput(operation, request),
          now: now(request),
          request,
        }
        const output = operation.output.parse(await call(asked).catch(asConflict))
        return Response.json(output, { status: operation.status ?? 200 })
      },
      (error) => log.error({ err: error, method: operation.method, path: operation.path }, 'request failed'),
    )
    return withHeaders(response)
  }
}

export function withHeaders(response: Response): Response {
  for (const [name, value] of Object.entries(SAFE_HEADERS)) response.headers.set(name, value)
  return response
}

async function admit(operation: Operation, request: Request): Promise<Who | null> {
  if (operation.method !== 'get') requireOwnOrigin(request)
  if (operation.access === 'demo' && env().mode === 'production')
    throw new Problem('not-found', 'There is nothing at this address.')
  if (operation.access !== 'signed-in') return null
  const who = await whoAsks(request)
  if (who === null) throw new Problem('not-signed-in', 'Sign in first.')
  return who
}

function readParams(operation: Operation, params: Record<string, string | string[] | undefined>): unknown {
  if (operation.params === undefined) return {}
  const parsed = operation.params.safeParse(params)
  // What is no id at all names nothing that exists.
  if (!parsed.success) throw new Problem('not-found', 'There is nothing at this address.')
  return parsed.data
}

function readQuery(operation: Operation, request: Request): unknown {
  if (operation.query === undefined) return {}
  const parsed = operation.query.safeParse(Object.fromEntries(new URL(request.url).searchParams))
  if (!parsed.success) throw invalid('bad-request', parsed.error)
  return parsed.data
}

async function readInput(operation: Operation, request: Request): Promise<unknown> {
  if (operation.body === undefined) return undefined
  const parsed = operation.body.safeParse(await readJson(request))
  if (!parsed.success) throw invalid('invalid', parsed.error)
  return parsed.data
}

/** PostgreSQL's codes for a key, or a span of time, that is taken. */
const TAKEN_CODES = new Set(['23505', '23P01'])

function asConflict(error: unknown): never {
  if (error instanceof Error && 'code' in error && TAKEN_CODES.has(String(error.code)))
    throw new Problem('conflict', 'Something like it is there already, or overlaps in time with it.', {
      cause: error,
    })
  throw error
}

function invalid(kind: 'bad-request' | 'invalid', error: z.ZodError): Problem {
  const errors = error.issues
    .slice(0, 20)
    .map((issue) => ({ path: issue.path.join('.'), message: issue.message }))
  const first = errors[0]
  const sentence = first === undefined ? 'Check what was sent' : `${first.path || 'It'}: ${first.message}`
  return new Problem(kind, `${sentence}.`, { extensions: { errors } })
}
