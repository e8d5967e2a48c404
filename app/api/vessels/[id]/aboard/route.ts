import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/vessels'
import { listAboard } from '@/lib/api/operations/account'
import { listAboard as list, setAboard } from '@/lib/vessels/set-aboard'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(listAboard, ({ person, params, now }) => list(person.personId, params.id, now)),
  PUT: handle(operations.setAboard, ({ person, params, body, now }) =>
    setAboard(person.personId, params.id, body, now),
  ),
})
