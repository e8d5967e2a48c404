import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/visits'
import { addGaugeTest } from '@/lib/visits/enter'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  POST: handle(operations.addGaugeTest, ({ person, params, body, now }) =>
    addGaugeTest(person, params.id, body, now),
  ),
})
