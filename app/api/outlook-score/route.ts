import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/suspects'
import { getOutlookScore } from '@/lib/reading/get-outlook-score'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.getOutlookScore, ({ person, now }) => getOutlookScore(person.personId, now)),
})
