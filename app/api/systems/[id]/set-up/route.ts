import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/set-up'
import { getSetUp } from '@/lib/systems/get-set-up'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.getSetUp, ({ person, params, now }) => getSetUp(person.personId, params.id, now)),
})
