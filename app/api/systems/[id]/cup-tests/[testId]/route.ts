import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/cup-tests'
import { takeBackCupTest } from '@/lib/cup-tests'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  DELETE: handle(operations.takeBackCupTest, ({ person, params, now }) =>
    takeBackCupTest(person.personId, params.id, params.testId, now),
  ),
})
