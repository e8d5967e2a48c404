import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/joining'
import { addressOf } from '@/lib/auth/address'
import { resendInvitation } from '@/lib/joining/invitations'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  POST: handle(operations.resendInvitation, ({ person, params, request, now }) =>
    resendInvitation(person, params.id, addressOf(request.headers), now),
  ),
})
