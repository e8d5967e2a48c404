import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/reading'
import { listRuns } from '@/lib/reading/list-runs'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.listRuns, ({ person, params, query, now }) =>
    listRuns(person.personId, params.id, query, now),
  ),
})
