import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/loggers'
import { rollKey } from '@/lib/loggers/manage-logger'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  POST: handle(operations.rollKey, ({ person, params, now }) => rollKey(person, params.id, now)),
})
