import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/account'
import { addressOf } from '@/lib/auth/address'
import { changeEmail } from '@/lib/account/change-email'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  PUT: handle(operations.changeEmail, ({ person, body, request, now }) =>
    changeEmail(person, body, addressOf(request.headers), now),
  ),
})
