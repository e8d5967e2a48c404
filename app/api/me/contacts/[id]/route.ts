import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/account'
import { changeContact, removeContact } from '@/lib/account/contacts'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  PATCH: handle(operations.changeContact, ({ person, params, body, now }) =>
    changeContact(person, params.id, body, now),
  ),
  DELETE: handle(operations.removeContact, ({ person, params, now }) =>
    removeContact(person, params.id, now),
  ),
})
