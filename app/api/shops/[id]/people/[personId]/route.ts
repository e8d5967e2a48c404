import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/joining'
import { setRoles } from '@/lib/joining/people'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  PUT: handle(operations.setRoles, ({ person, params, body, now }) =>
    setRoles(person, params.id, params.personId, body.roles, now),
  ),
})
