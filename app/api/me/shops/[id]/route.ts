import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/joining'
import { leaveShop } from '@/lib/joining/people'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  DELETE: handle(operations.leaveShop, ({ person, params, now }) => leaveShop(person, params.id, now)),
})
