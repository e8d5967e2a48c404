import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/people'
import { changePassword } from '@/lib/people/me'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  PUT: handle(operations.changePassword, ({ person, body }) => changePassword(person, body, new Date())),
})
