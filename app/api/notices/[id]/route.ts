import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/notices'
import { snoozeNotice } from '@/lib/notices/answer-notice'
import { getNotice } from '@/lib/notices/read-notices'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.getNotice, ({ person, params }) => getNotice(person.personId, params.id)),
  PATCH: handle(operations.snoozeNotice, ({ person, params, body, now }) =>
    snoozeNotice(person, params.id, body.snoozedUntil, now),
  ),
})
