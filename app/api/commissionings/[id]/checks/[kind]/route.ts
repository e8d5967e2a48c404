import { rederiveAt } from '@/ingest/rederive'
import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/commissionings'
import { stepCheck } from '@/lib/commissioning/step-check'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  POST: handle(operations.stepCheck, ({ person, params, body, now }) =>
    stepCheck(person, params.id, params.kind, body, now, rederiveAt(now)),
  ),
})
