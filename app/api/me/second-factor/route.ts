import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/account'
import { beginSecondFactor, confirmSecondFactor, getSecondFactor } from '@/lib/account/second-factor'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.getSecondFactor, ({ person }) => getSecondFactor(person)),
  POST: handle(operations.beginSecondFactor, ({ person, body }) => beginSecondFactor(person, body.password)),
  PUT: handle(operations.confirmSecondFactor, ({ person, body, now }) =>
    confirmSecondFactor(person, body.code, now),
  ),
})
