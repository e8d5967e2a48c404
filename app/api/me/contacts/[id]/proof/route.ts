import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/account'
import { addressOf } from '@/lib/auth/address'
import { resendProof } from '@/lib/account/contacts'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  POST: handle(operations.resendProof, ({ person, params, request, now }) =>
    resendProof(person, params.id, addressOf(request.headers), now),
  ),
})
