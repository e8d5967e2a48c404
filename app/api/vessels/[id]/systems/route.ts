import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/vessels'
import { addSystem } from '@/lib/systems/add-system'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  POST: handle(operations.addSystem, ({ person, params, body, now }) =>
    addSystem(person.personId, params.id, body, now),
  ),
})
