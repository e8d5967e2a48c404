import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/account'
import { exportAccount } from '@/lib/account/export'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.exportAccount, ({ person, now }) => exportAccount(person, now)),
})
