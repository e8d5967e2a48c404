import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/joining'
import { addressOf } from '@/lib/auth/address'
import { confirm } from '@/lib/joining/confirm'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  POST: handle(operations.confirmEmail, ({ body, request, now }) =>
    confirm(body, addressOf(request.headers), now),
  ),
})
