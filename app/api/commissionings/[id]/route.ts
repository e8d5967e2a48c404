import { rederiveAt } from '@/ingest/rederive'
import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/commissionings'
import { changeCommissioning } from '@/lib/commissioning/change-commissioning'
import { getCommissioning } from '@/lib/commissioning/read-commissionings'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.getCommissioning, ({ person, params, now }) =>
    getCommissioning(person, params.id, now),
  ),
  PATCH: handle(operations.changeCommissioning, ({ person, params, body, now }) =>
    changeCommissioning(person, params.id, body, now, rederiveAt(now)),
  ),
})
