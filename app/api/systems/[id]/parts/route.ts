import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/vessels'
import { setParts } from '@/lib/systems/set-parts'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  PUT: handle(operations.setParts, ({ person, params, body, now }) =>
    setParts(person.personId, params.id, body.parts, now),
  ),
})
