import { OpenAPIRegistry, OpenApiGeneratorV31, type RouteConfig } from '@asteasolutions/zod-to-openapi'
import { z } from 'zod'
import { ingestAnswerSchema, oauthErrorSchema, problemSchema } from '@/shared/schemas'
import type { Operation } from './operation'
import { OPERATIONS } from './operations'

type Document = Record<string, unknown>
const json = (schema: z.ZodType) => ({ 'application/json': { schema } })
const problem = (description: string) => ({
  description,
  content: { 'application/problem+json': { schema: problemSchema } },
})

/** The contract as OpenAPI 3.1, from the same schemas that the handlers parse with. */
export function openApiDocument(serverUrl: string): Document {
  const registry = new OpenAPIRegistry()
  registry.registerComponent('securitySchemes', 'session', {
    type: 'apiKey',
    in: 'cookie',
    name: 'next-auth.session-token',
    description: 'From the credentials flow; over https the name begins with __Secure-.',
  })
  registry.registerComponent('securitySchemes', 'loggerKey', { type: 'http', scheme: 'bearer' })
  for (const operation of OPERATIONS) registry.registerPath(pathOf(operation))
  for (const path of [...SIGN_IN, INGEST, RECORD_PDF]) registry.registerPath(path)
  const document = new OpenApiGeneratorV31(registry.definitions).generateDocument({
    openapi: '3.1.0',
    info: {
      title: 'Middlewatch',
      version: '1',
      description:
        'Ids are strings, times RFC 3339 UTC, units SI and in the names. Intervals are 95 %; null is unknown or unbounded. Errors are RFC 9457 problem details.',
    },
    servers: [{ url: serverUrl }],
  })
  return { ...document }
}

function pathOf(operation: Operation): RouteConfig {
  const { method, path, summary, tag, params, query, body, form, output } = operation
  const oauth = form !== undefined
  return {
    method,
    path,
    summary,
    tags: [tag],
    ...(operation.access === 'signed-in' ? { security: [{ session: [] }] } : { security: [] }),
    request: {
      ...(isObject(params) ? { params } : {}),
      ...(isObject(query) ? { query } : {}),
      ...(body === undefined ? {} : { body: { content: json(body), required: true } }),
      ...(form === undefined
        ? {}
        : { body: { content: { 'application/x-www-form-urlencoded': { schema: form } }, required: true } }),
    },
    responses: {
      [operation.status ?? 200]: { description: 'Done', content: json(output) },
      ...(oauth
        ? { 400: { description: 'Refused (RFC 6749 5.2)', content: json(oauthErrorSchema) } }
        : refusals(operation)),
    },
  }
}

const isObject = (schema: z.ZodType | undefined): schema is z.ZodObject => schema instanceof z.ZodObject

function refusals(operation: Operation): RouteConfig['responses'] {
  return {
    ...(operation.query === undefined && operation.body === undefined
      ? {}
      : { 400: problem('Not parseable, or a query that is not right') }),
    ...(operation.access === 'signed-in' ? { 401: problem('Nobody is signed in') } : {}),
    ...(operation.access === 'signed-in' && operation.method !== 'get'
      ? { 403: problem('Sight without the right, or a request from another site') }
      : {}),
    ...(operation.params === undefined ? {} : { 404: problem('It does not exist, or is not yours to see') }),
    ...(operation.body === undefined
      ? {}
      : {
          415: problem('Not JSON'),
          422: problem('What was sent cannot be taken; `errors` says where'),
        }),
  }
}

const form = (schema: z.ZodType) => ({ 'application/x-www-form-urlencoded': { schema } })
const SIGN_IN: RouteConfig[] = [
  {
    method: 'get',
    path: '/api/auth/csrf',
    summary: 'A token that goes with the forms of signing in and out, and its cookie',
    tags: ['Sign-in'],
    security: [],
    responses: { 200: { description: 'Done', content: json(z.object({ csrfToken: z.string() })) } },
  },
  {
    method: 'post',
    path: '/api/auth/callback/credentials',
    summary: 'Sign in; sets the session cookie',
    tags: ['Sign-in'],
    security: [],
    request: {
      body: {
        required: true,
        content: form(
          z.object({
            email: z.string(),
            password: z.string(),
            csrfToken: z.string(),
            json: z.literal('true').optional(),
          }),
        ),
      },
    },
    responses: {
      200: { description: 'Signed in', content: json(z.object({ url: z.string() })) },
      401: { description: 'Not the right e-mail and password' },
      429: problem('Too many tries'),
    },
  },
  {
    method: 'get',
    path: '/api/auth/session',
    summary: 'Name and address of who is signed in, or nothing',
    tags: ['Sign-in'],
    responses: { 200: { description: 'Done', content: json(z.record(z.string(), z.unknown())) } },
  },
  {
    method: 'post',
    path: '/api/auth/signout',
    summary: 'Sign out; the session ends',
    tags: ['Sign-in'],
    request: {
      body: {
        required: true,
        content: form(z.object({ csrfToken: z.string(), json: z.literal('true').optional() })),
      },
    },
    responses: { 200: { description: 'Done', content: json(z.object({ url: z.string() })) } },
  },
]

const INGEST: RouteConfig = {
  method: 'post',
  path: '/api/ingest',
  summary: 'Samples from a logger: SenML (RFC 8428) or CSV (RFC 4180), gzip allowed',
  tags: ['Loggers'],
  security: [{ loggerKey: [] }],
  request: {
    headers: z.object({
      'Idempotency-Key': z.string().max(200).optional(),
      'Content-Encoding': z.enum(['gzip']).optional(),
    }),
    body: {
      required: true,
      content: {
        'application/senml+json': { schema: z.array(z.record(z.string(), z.unknown())) },
        'text/csv': { schema: z.string() },
      },
    },
  },
  responses: {
    200: { description: 'Taken, and committed', content: json(ingestAnswerSchema) },
    400: problem('Not parseable: where'),
    401: problem('No key, or an unknown one'),
    403: problem('The logger is retired'),
    413: problem('Over 8 MiB sent or 64 MiB unpacked'),
    415: problem('Neither SenML nor CSV'),
    422: problem('Parseable, and nothing in it usable'),
    429: problem('Come again after Retry-After'),
    503: problem('Come again after Retry-After'),
  },
}

const RECORD_PDF: RouteConfig = {
  method: 'get',
  path: '/api/loggers/{id}/commissioning/pdf',
  summary: 'The commissioning record of a logger as a PDF',
  tags: ['Commissioning'],
  security: [{ session: [] }],
  request: {
    params: z.object({ id: z.string() }),
    query: z.object({ units: z.enum(['inHg', 'kPa', 'mbar']).optional() }),
  },
  responses: {
    200: { description: 'The record', content: { 'application/pdf': { schema: z.string() } } },
    401: problem('Nobody is signed in'),
    404: problem('No such logger or record, or not yours to see'),
  },
}
