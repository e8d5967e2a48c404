import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/joining'
import { addressOf } from '@/lib/auth/address'
import { readInvitationTo } from '@/lib/joining/accept'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  POST: handle(operations.lookAtInvitation, ({ body, request, now }) =>
    readInvitationTo(body.token, addressOf(request.headers), now),
  ),
})
