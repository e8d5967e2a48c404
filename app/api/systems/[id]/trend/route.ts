import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/reading'
import { getTrend } from '@/lib/reading/get-trend'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.getTrend, ({ person, params, query, now }) =>
    getTrend(person.personId, params.id, query, now),
  ),
})
