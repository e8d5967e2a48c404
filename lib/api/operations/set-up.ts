import { knownZoneSchema, listOf, setUpSchema, timeZonesQuerySchema } from '@/shared/schemas'
import { operation } from '../operation'
import { byId } from './vessels'

const read = { method: 'get', tag: 'Vessels', access: 'signed-in' } as const

export const getSetUp = operation({
  ...read,
  path: '/api/systems/{id}/set-up',
  summary: 'The test points that the drawing allows, and who changed what of the set-up',
  params: byId,
  output: setUpSchema,
})

export const listTimeZones = operation({
  ...read,
  path: '/api/time-zones',
  summary: 'Time zones whose name holds the words searched for',
  query: timeZonesQuerySchema,
  output: listOf(knownZoneSchema),
})

export const setUpOperations = [getSetUp, listTimeZones]
