import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/commissionings'
import { liveReadings } from '@/lib/commissioning/live-readings'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.liveReadings, ({ person, params, now }) => liveReadings(person, params.id, now)),
})
