import { rederiveAt } from '@/ingest/rederive'
import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/commissionings'
import { fitLogger } from '@/lib/commissioning/fit-logger'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  POST: handle(operations.fitLogger, ({ person, params, body, now }) =>
    fitLogger(person, params.id, body, now, rederiveAt(now)),
  ),
})
