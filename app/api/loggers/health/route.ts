import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/commissionings'
import { listLoggerHealth } from '@/lib/commissioning/read-commissionings'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.listLoggerHealth, ({ person, query }) => listLoggerHealth(person, query)),
})
