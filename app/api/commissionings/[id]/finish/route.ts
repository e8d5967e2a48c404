import { rederiveAt } from '@/ingest/rederive'
import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/commissionings'
import { finish } from '@/lib/commissioning/change-commissioning'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  POST: handle(operations.finishCommissioning, ({ person, params, body, now }) =>
    finish(person, params.id, body.note, now, rederiveAt(now)),
  ),
})
