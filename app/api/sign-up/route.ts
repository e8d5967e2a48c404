import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/joining'
import { addressOf } from '@/lib/auth/address'
import { signUp } from '@/lib/joining/sign-up'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  POST: handle(operations.signUp, ({ body, request, now }) => signUp(body, addressOf(request.headers), now)),
})
