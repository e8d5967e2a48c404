/**
 * Every refusal leaves as problem details (RFC 9457): a stable `type`, a title that names the kind, and one
 * sentence that a person can act on. Nothing of the inside ever leaves.
 */

const TYPE_BASE = 'https://middlewatch.example/problems/'

/** The closed list of kinds. A kind's name and status are part of the contract: never reuse one. */
export const PROBLEM_KINDS = {
  'not-parseable': { status: 400, title: 'The body could not be read' },
  'bad-request': { status: 400, title: 'The request is not right' },
  'not-signed-in': { status: 401, title: 'Nobody is signed in' },
  'unknown-key': { status: 401, title: 'The logger key is missing or unknown' },
  'not-allowed': { status: 403, title: 'Not allowed' },
  'wrong-origin': { status: 403, title: 'The request came from another site' },
  retired: { status: 403, title: 'The logger is retired' },
  'not-found': { status: 404, title: 'Not found' },
  'wrong-method': { status: 405, title: 'This address does not take that method' },
  conflict: { status: 409, title: 'It stands in the way of something that is there already' },
  gone: { status: 410, title: 'No longer there' },
  'too-large': { status: 413, title: 'The body is too large' },
  'wrong-media-type': { status: 415, title: 'The body is of a kind that is not taken here' },
  invalid: { status: 422, title: 'Some of what was entered cannot be taken' },
  'nothing-usable': { status: 422, title: 'Nothing in the upload could be used' },
  'too-many-requests': { status: 429, title: 'Too many requests' },
  internal: { status: 500, title: 'Something went wrong here' },
  busy: { status: 503, title: 'Busy at the moment' },
} as const

export type ProblemKind = keyof typeof PROBLEM_KINDS

export interface ProblemOptions {
  /** Further members of the problem document, such as the list of rejected records. */
  extensions?: Record<string, unknown>
  headers?: Record<string, string>
  cause?: unknown
}

/** Thrown by services; turned into its response at the edge by `problemResponse` or `answering`. */
export class Problem extends Error {
  readonly kind: ProblemKind
  readonly extensions: Record<string, unknown>
  readonly headers: Record<string, string>

  /** @param detail one sentence that says what to do about it; shown to the caller. */
  constructor(kind: ProblemKind, detail: string, options: ProblemOptions = {}) {
    super(detail, { cause: options.cause })
    this.name = 'Problem'
    this.kind = kind
    this.extensions = options.extensions ?? {}
    this.headers = options.headers ?? {}
  }

  get status(): number {
    return PROBLEM_KINDS[this.kind].status
  }
}

/** The response that carries a problem, as `application/problem+json`. */
export function problemResponse(problem: Problem): Response {
  const { status, title } = PROBLEM_KINDS[problem.kind]
  const body = {
    ...problem.extensions,
    type: TYPE_BASE + problem.kind,
    title,
    status,
    detail: problem.message,
  }
  return new Response(JSON.stringify(body), {
    status,
    headers: {
      'content-type': 'application/problem+json',
      'cache-control': 'no-store',
      ...problem.headers,
    },
  })
}

/** PostgreSQL's codes for "somebody else holds it": lock timeout, deadlock, serialisation, too many clients. */
const BUSY_CODES = new Set(['55P03', '40P01', '40001', '53300', '57P03'])
export const RETRY_AFTER_BUSY_SECONDS = 10

/** Any thrown thing as a problem: a busy database asks to come again, the unforeseen becomes `internal`. */
export function toProblem(error: unknown): Problem {
  if (error instanceof Problem) return error
  if (error instanceof Error) {
    const code = 'code' in error && typeof error.code === 'string' ? error.code : ''
    // Knex names a pool that gave no connection in time only by the class of its error.
    if (BUSY_CODES.has(code) || error.name === 'KnexTimeoutError' || code === 'ECONNREFUSED')
      return new Problem('busy', `Try again in ${RETRY_AFTER_BUSY_SECONDS} seconds; nothing was changed.`, {
        headers: { 'retry-after': String(RETRY_AFTER_BUSY_SECONDS) },
        cause: error,
      })
  }
  return new Problem('internal', 'It has been logged. Try again; if it stays, tell the shop.', {
    cause: error,
  })
}

/**
 * Runs a handler and answers whatever it throws as problem details.
 * @param log told of problems of our own making (status 500), with the cause.
 */
export async function answering(
  work: () => Promise<Response>,
  log: (error: unknown) => void,
): Promise<Response> {
  try {
    return await work()
  } catch (error) {
    const problem = toProblem(error)
    if (problem.status === 500) log(problem.cause ?? problem)
    return problemResponse(problem)
  }
}
