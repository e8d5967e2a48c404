import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/joining'
import { withdrawInvitation } from '@/lib/joining/invitations'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  DELETE: handle(operations.withdrawInvitation, ({ person, params, now }) =>
    withdrawInvitation(person, params.id, now),
  ),
})
