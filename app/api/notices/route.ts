import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/notices'
import { listNotices } from '@/lib/notices/read-notices'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.listNotices, ({ person, query }) => listNotices(person.personId, query)),
})
