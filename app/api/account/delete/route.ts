import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/account'
import { deleteAccount, previewDeletion } from '@/lib/account/delete-account'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.previewDeletion, ({ person }) => previewDeletion(person)),
  POST: handle(operations.deleteAccount, ({ person, body, now }) => deleteAccount(person, body, now)),
})
