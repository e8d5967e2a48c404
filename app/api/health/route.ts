import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/service'
import { getHealth } from '@/lib/health/get-health'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.getHealth, ({ now }) => getHealth(now)),
})
