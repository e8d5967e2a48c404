import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/account'
import { endSession } from '@/lib/account/sessions'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  DELETE: handle(operations.endSession, ({ person, params, now }) => endSession(person, params.id, now)),
})
