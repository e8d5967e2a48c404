import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/visits'
import { addPartChange } from '@/lib/visits/enter'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  POST: handle(operations.addPartChange, ({ person, params, body }) =>
    addPartChange(person, params.id, body),
  ),
})
