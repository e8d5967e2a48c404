import { rederiveAt } from '@/ingest/rederive'
import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/loggers'
import { retireLogger } from '@/lib/loggers/manage-logger'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  DELETE: handle(operations.retireLogger, ({ person, params, now }) =>
    retireLogger(person, params.id, now, rederiveAt(now)),
  ),
})
