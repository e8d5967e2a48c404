import { rederiveAt } from '@/ingest/rederive'
import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/loggers'
import { registerLogger } from '@/lib/loggers/register-logger'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  POST: handle(operations.registerLogger, ({ person, params, body, now }) =>
    registerLogger(person, params.id, body, now, rederiveAt(now)),
  ),
})
