import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/reading'
import { readTrace } from '@/lib/reading/trace'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.getTrace, ({ person, params, query, now }) =>
    readTrace(person.personId, params.id, query, now),
  ),
})
