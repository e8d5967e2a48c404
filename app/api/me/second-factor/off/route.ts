import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/account'
import { endSecondFactor } from '@/lib/account/second-factor'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  POST: handle(operations.endSecondFactor, ({ person, body, now }) => endSecondFactor(person, body, now)),
})
