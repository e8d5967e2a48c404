import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/suspects'
import { getSuspects } from '@/lib/reading/get-suspects'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.getSuspects, ({ person, params, query, now }) =>
    getSuspects(person.personId, params.id, query.at === undefined ? now : new Date(query.at), now),
  ),
})
