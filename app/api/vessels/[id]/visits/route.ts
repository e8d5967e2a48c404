import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/visits'
import { askVisit } from '@/lib/visits/ask-visit'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  POST: handle(operations.askVisit, ({ person, params, body, now }) =>
    askVisit(person, params.id, body, now),
  ),
})
