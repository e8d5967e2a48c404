import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/commissionings'
import { listCommissionings } from '@/lib/commissioning/read-commissionings'
import { startCommissioning } from '@/lib/commissioning/start-commissioning'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.listCommissionings, ({ person, query, now }) =>
    listCommissionings(person, query, now),
  ),
  POST: handle(operations.startCommissioning, ({ person, body, now }) =>
    startCommissioning(person, body, now),
  ),
})
