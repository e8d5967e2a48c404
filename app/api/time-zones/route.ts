import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/set-up'
import { findTimeZones } from '@/lib/vessels/find-time-zones'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.listTimeZones, ({ person, query }) => findTimeZones(person.personId, query)),
})
