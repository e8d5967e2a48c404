import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/visits'
import { listVisits } from '@/lib/visits/list-visits'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.listVisits, ({ person, query }) => listVisits(person.personId, query)),
})
