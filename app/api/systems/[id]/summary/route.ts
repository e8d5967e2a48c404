import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/reading'
import { getSummary } from '@/lib/reading/get-summary'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.getSummary, ({ person, params, query, now }) =>
    getSummary(person.personId, params.id, query.at === undefined ? now : new Date(query.at)),
  ),
})
