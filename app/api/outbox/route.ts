import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/notices'
import { getOutbox } from '@/lib/messages/read-messages'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.getOutbox, () => getOutbox()),
})
