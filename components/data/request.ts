/** An answer that was not a success, in words a person can act on (RFC 9457). Status 0: nothing came back. */
export class ApiProblem extends Error {
  constructor(
    readonly status: number,
    readonly type: string,
    sentence: string,
    /** What is wrong with which field, where the server says so. */
    readonly errors: readonly { path: string; message: string }[] = [],
  ) {
    super(sentence)
    this.name = 'ApiProblem'
  }
}

const NO_ANSWER = 'No answer from Middlewatch. Check the connection; nothing you entered is lost.'

const isFieldError = (entry: unknown): entry is { path: string; message: string } =>
  typeof entry === 'object' &&
  entry !== null &&
  'path' in entry &&
  typeof entry.path === 'string' &&
  'message' in entry &&
  typeof entry.message === 'string'

async function problemOf(response: Response): Promise<ApiProblem> {
  try {
    const body: { type?: unknown; title?: unknown; detail?: unknown; errors?: unknown } =
      await response.json()
    const sentence = [body.detail, body.title].find((text) => typeof text === 'string' && text !== '')
    return new ApiProblem(
      response.status,
      typeof body.type === 'string' ? body.type : 'about:blank',
      typeof sentence === 'string' ? sentence : `The server answered ${response.status}.`,
      Array.isArray(body.errors) ? body.errors.filter(isFieldError) : [],
    )
  } catch {
    return new ApiProblem(response.status, 'about:blank', `The server answered ${response.status}.`)
  }
}

async function answered(path: string, init?: RequestInit): Promise<Response> {
  let response: Response
  try {
    response = await fetch(path, { credentials: 'same-origin', ...init })
  } catch {
    throw new ApiProblem(0, 'no-answer', NO_ANSWER)
  }
  if (!response.ok) throw await problemOf(response)
  return response
}

/** Reads JSON. Throws `ApiProblem`. */
export async function request<Answer>(path: string): Promise<Answer> {
  const response = await answered(path, { headers: { accept: 'application/json' } })
  return response.json()
}

/** Writes JSON and returns what came back, or null for an empty answer. Throws `ApiProblem`. */
export async function send<Answer = unknown>(
  method: 'POST' | 'PUT' | 'PATCH' | 'DELETE',
  path: string,
  body?: unknown,
): Promise<Answer | null> {
  const response = await answered(path, {
    method,
    headers: { 'content-type': 'application/json', accept: 'application/json' },
    body: JSON.stringify(body ?? {}),
  })
  const text = await response.text()
  return text === '' ? null : JSON.parse(text)
}

/** The address with its query; entries that are undefined or empty are left out. */
export function withQuery(path: string, query: Record<string, string | number | undefined>): string {
  const search = new URLSearchParams()
  for (const [key, value] of Object.entries(query)) {
    if (value !== undefined && value !== '') search.set(key, String(value))
  }
  const text = search.toString()
  return text === '' ? path : `${path}?${text}`
}
