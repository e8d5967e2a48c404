import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/vessels'
import { changeVessel } from '@/lib/vessels/change-vessel'
import { getVessel } from '@/lib/vessels/get-vessel'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.getVessel, ({ person, params, now }) => getVessel(person.personId, params.id, now)),
  PATCH: handle(operations.changeVessel, ({ person, params, body, now }) =>
    changeVessel(person.personId, params.id, body, now),
  ),
})
