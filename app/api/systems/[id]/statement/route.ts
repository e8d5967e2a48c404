import { rederiveAt } from '@/ingest/rederive'
import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/vessels'
import { setStatements } from '@/lib/systems/set-statement'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  PUT: handle(operations.setStatement, ({ person, params, body, now }) =>
    setStatements(person.personId, [params.id], body, now, rederiveAt(now)),
  ),
})
