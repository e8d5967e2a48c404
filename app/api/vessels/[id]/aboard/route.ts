import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/vessels'
import { setAboard } from '@/lib/vessels/set-aboard'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  PUT: handle(operations.setAboard, ({ person, params, body, now }) =>
    setAboard(person.personId, params.id, body, now),
  ),
})
