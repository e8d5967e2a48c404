import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/service'
import { calculateIsolation } from '@/lib/calculators/calculate'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  POST: handle(operations.isolation, async ({ body }) => calculateIsolation(body)),
})
