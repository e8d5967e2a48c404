import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/notices'
import { resendMessage } from '@/lib/messages/read-messages'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  POST: handle(operations.resendMessage, ({ person, params, now }) => resendMessage(person, params.id, now)),
})
