import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/account'
import { endOthers, listSessions } from '@/lib/account/sessions'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.listSessions, ({ person, now }) => listSessions(person, now)),
  DELETE: handle(operations.endOtherSessions, ({ person, now }) => endOthers(person, now)),
})
