import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/reading'
import { listNights } from '@/lib/reading/list-nights'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.listNights, ({ person, query, now }) =>
    listNights(person.personId, query, query.at === undefined ? now : new Date(query.at)),
  ),
})
