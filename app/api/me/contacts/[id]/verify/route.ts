import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/account'
import { verifyContact } from '@/lib/account/contacts'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  POST: handle(operations.verifyContact, ({ person, params, body, now }) =>
    verifyContact(person, params.id, body.code, now),
  ),
})
