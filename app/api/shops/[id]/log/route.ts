import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/joining'
import { shopLog } from '@/lib/joining/read-log'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.shopLog, ({ person, params, query }) => shopLog(person, params.id, query)),
})
