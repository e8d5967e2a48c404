import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/joining'
import { listPeople } from '@/lib/joining/people'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.listPeople, ({ person, params }) => listPeople(person, params.id)),
})
