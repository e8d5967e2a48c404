import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/links'
import { addressOf } from '@/lib/auth/address'
import { followLink, readLink } from '@/lib/messages/follow-link'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.readLink, ({ params, request, now }) =>
    readLink(params.code, addressOf(request.headers), now),
  ),
  POST: handle(operations.followLink, ({ params, body, request, now }) =>
    followLink(params.code, body, addressOf(request.headers), now),
  ),
})
