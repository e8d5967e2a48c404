import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/reading'
import { listHolds } from '@/lib/reading/list-holds'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.listHolds, ({ person, params, query, now }) =>
    listHolds(person.personId, params.id, query, now),
  ),
})
