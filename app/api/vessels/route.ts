import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/vessels'
import { listFleet } from '@/lib/fleet/list-fleet'
import { createVessel } from '@/lib/vessels/create-vessel'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.listVessels, ({ person, query, now }) => listFleet(person.personId, query, now)),
  POST: handle(operations.createVessel, ({ person, body, now }) => createVessel(person, body, now)),
})
