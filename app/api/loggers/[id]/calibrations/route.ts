import { rederiveAt } from '@/ingest/rederive'
import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/loggers'
import { calibrateLogger } from '@/lib/loggers/manage-logger'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  POST: handle(operations.calibrateLogger, ({ person, params, body, now }) =>
    calibrateLogger(person, params.id, body, now, rederiveAt(now)),
  ),
})
