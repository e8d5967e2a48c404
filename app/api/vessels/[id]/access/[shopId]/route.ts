import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/vessels'
import { setAccess, withdrawAccess } from '@/lib/vessels/set-access'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  PUT: handle(operations.setAccess, ({ person, params, body, now }) =>
    setAccess(person.personId, { vesselId: params.id, shopId: params.shopId, level: body.level }, now),
  ),
  DELETE: handle(operations.withdrawAccess, ({ person, params, now }) =>
    withdrawAccess(person.personId, params.id, params.shopId, now),
  ),
})
