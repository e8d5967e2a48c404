import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/reading'
import { getComparison } from '@/lib/reading/get-comparison'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.getComparison, ({ person, params, query, now }) =>
    getComparison(person.personId, params.id, query, now),
  ),
})
