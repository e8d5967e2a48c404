import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/loggers'
import { listLoggers } from '@/lib/loggers/list-loggers'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.listLoggers, ({ person, query, now }) => listLoggers(person.personId, query, now)),
})
