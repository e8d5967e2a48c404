import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/visits'
import { changeVisit } from '@/lib/visits/change-visit'
import { getVisit } from '@/lib/visits/list-visits'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.getVisit, ({ person, params }) => getVisit(person.personId, params.id)),
  PATCH: handle(operations.changeVisit, ({ person, params, body, now }) =>
    changeVisit(person, params.id, body, now),
  ),
})
