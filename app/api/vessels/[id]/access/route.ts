import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/joining'
import { getVesselAccess } from '@/lib/joining/vessel-access'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.getVesselAccess, ({ person, params }) => getVesselAccess(person, params.id)),
})
