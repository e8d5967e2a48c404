import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/cup-tests'
import { listCupTests, startCupTest } from '@/lib/cup-tests'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.listCupTests, ({ person, params, query, now }) =>
    listCupTests(person.personId, params.id, query.at === undefined ? now : new Date(query.at), now),
  ),
  POST: handle(operations.startCupTest, ({ person, params, body, now }) =>
    startCupTest(person.personId, params.id, body, now),
  ),
})
