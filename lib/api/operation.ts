import type { z } from 'zod'

export type Method = 'get' | 'post' | 'put' | 'patch' | 'delete'

/** One address and method: what goes in and what comes out. Handlers and the OpenAPI document are made from it. */
export interface Operation<
  Params extends z.ZodType = z.ZodType,
  Query extends z.ZodType = z.ZodType,
  Body extends z.ZodType = z.ZodType,
  Output extends z.ZodType = z.ZodType,
> {
  method: Method
  /** With `{name}` for what varies. */
  path: string
  summary: string
  tag: string
  /** `everybody` needs no sign-in; `demo` neither, and exists only in demo and test. */
  access: 'signed-in' | 'everybody' | 'demo'
  params?: Params
  query?: Query
  body?: Body
  /** A form instead of JSON; its handler reads it itself. */
  form?: z.ZodType
  output: Output
  /** Of the answer when all is well; default 200. */
  status?: number
}

export const operation = <
  Params extends z.ZodType,
  Query extends z.ZodType,
  Body extends z.ZodType,
  Output extends z.ZodType,
>(
  definition: Operation<Params, Query, Body, Output>,
): Operation<Params, Query, Body, Output> => definition
