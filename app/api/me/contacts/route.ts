import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/account'
import { addressOf } from '@/lib/auth/address'
import { addContact, listContacts } from '@/lib/account/contacts'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.listContacts, ({ person }) => listContacts(person)),
  POST: handle(operations.addContact, ({ person, body, request, now }) =>
    addContact(person, body, addressOf(request.headers), now),
  ),
})
