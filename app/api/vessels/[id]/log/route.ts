import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/joining'
import { vesselLog } from '@/lib/joining/read-log'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.vesselLog, ({ person, params, query }) => vesselLog(person, params.id, query)),
})
