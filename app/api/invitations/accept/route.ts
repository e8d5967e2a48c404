import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/joining'
import { addressOf } from '@/lib/auth/address'
import { whoAsks } from '@/lib/auth/who'
import { acceptInvitation } from '@/lib/joining/accept'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  POST: handle(operations.acceptInvitation, async ({ body, request, now }) =>
    acceptInvitation(await whoAsks(request), body, addressOf(request.headers), now),
  ),
})
