import { atQuerySchema, outlookScoreSchema, suspectsSchema } from '@/shared/schemas'
import { operation } from '../operation'
import { byId } from './vessels'

const read = { method: 'get', tag: 'Reading', access: 'signed-in' } as const

export const getSuspects = operation({
  ...read,
  path: '/api/systems/{id}/suspects',
  summary: 'What the record says leaks before anybody goes; needs the full record',
  params: byId,
  query: atQuerySchema,
  output: suspectsSchema,
})

export const getOutlookScore = operation({
  ...read,
  path: '/api/outlook-score',
  summary: 'How the nights foretold came out, over the systems one sees, the last 30 nights',
  output: outlookScoreSchema,
})

export const suspectsOperations = [getSuspects, getOutlookScore]
