import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/notices'
import { acknowledgeNotice } from '@/lib/notices/answer-notice'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  POST: handle(operations.acknowledgeNotice, ({ person, params, body, now }) =>
    acknowledgeNotice(person, params.id, body.note, now),
  ),
})
