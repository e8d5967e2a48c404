import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/joining'
import { addressOf } from '@/lib/auth/address'
import { resetPassword } from '@/lib/joining/reset-password'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  POST: handle(operations.resetPassword, ({ body, request, now }) =>
    resetPassword(body, addressOf(request.headers), now),
  ),
})
