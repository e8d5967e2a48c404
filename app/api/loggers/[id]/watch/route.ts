import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/loggers'
import { watchLogger } from '@/lib/loggers/manage-logger'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  POST: handle(operations.watchLogger, ({ person, params, body, now }) =>
    watchLogger(person, params.id, body, now),
  ),
})
