import { rederiveAt } from '@/ingest/rederive'
import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/vessels'
import { changeSettings, getSettings } from '@/lib/systems/change-settings'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.getSettings, ({ person, params, now }) =>
    getSettings(person.personId, params.id, now),
  ),
  PUT: handle(operations.changeSettings, ({ person, params, body, now }) =>
    changeSettings(person.personId, params.id, body, now, rederiveAt(now)),
  ),
})
