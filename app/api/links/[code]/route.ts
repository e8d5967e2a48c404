import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/links'
import { followLink, readLink } from '@/lib/messages/follow-link'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.readLink, ({ params, now }) => readLink(params.code, now)),
  POST: handle(operations.followLink, ({ params, body, now }) => followLink(params.code, body, now)),
})
