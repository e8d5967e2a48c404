import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/people'
import { listShops } from '@/lib/people/me'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.listShops, () => listShops()),
})
