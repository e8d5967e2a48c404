import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/joining'
import { openOwnShop } from '@/lib/joining/shop'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  POST: handle(operations.openShop, ({ person, body, now }) => openOwnShop(person, body, now)),
})
