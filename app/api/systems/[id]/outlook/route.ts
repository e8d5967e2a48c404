import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/reading'
import { getOutlook } from '@/lib/reading/get-outlook'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.getOutlook, ({ person, params, query, now }) =>
    getOutlook(person.personId, params.id, query.at === undefined ? now : new Date(query.at)),
  ),
})
