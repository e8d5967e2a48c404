import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/joining'
import { changeShop, getShop } from '@/lib/joining/shop'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.getShop, ({ person, params }) => getShop(person, params.id)),
  PATCH: handle(operations.changeShop, ({ person, params, body, now }) =>
    changeShop(person, params.id, body, now),
  ),
})
