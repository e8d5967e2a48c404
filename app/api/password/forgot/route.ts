import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/joining'
import { addressOf } from '@/lib/auth/address'
import { forgotPassword } from '@/lib/joining/reset-password'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  POST: handle(operations.forgotPassword, ({ body, request, now }) =>
    forgotPassword(body.email, addressOf(request.headers), now),
  ),
})
