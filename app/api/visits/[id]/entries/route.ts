import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/visits'
import { addVisitEntry } from '@/lib/visits/enter'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  POST: handle(operations.addVisitEntry, ({ person, params, body }) =>
    addVisitEntry(person, params.id, body),
  ),
})
