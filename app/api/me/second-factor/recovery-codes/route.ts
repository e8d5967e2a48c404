import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/account'
import { renewRecoveryCodes } from '@/lib/account/second-factor'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  POST: handle(operations.renewRecoveryCodes, ({ person, body, now }) =>
    renewRecoveryCodes(person, body, now),
  ),
})
