import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/joining'
import { addressOf } from '@/lib/auth/address'
import { invite, listInvitations } from '@/lib/joining/invitations'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.listInvitations, ({ person, query }) => listInvitations(person, query)),
  POST: handle(operations.invite, ({ person, body, request, now }) =>
    invite(person, body, addressOf(request.headers), now),
  ),
})
