import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import { openApiDocument } from '@/lib/api/openapi'
import * as operations from '@/lib/api/operations/service'
import { env } from '@/lib/env'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.getOpenApi, async () => openApiDocument(env().appUrl)),
})
