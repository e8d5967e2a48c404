import {
  atQuerySchema,
  comparisonQuerySchema,
  comparisonSchema,
  holdSchema,
  listOf,
  nightsQuerySchema,
  nightsSchema,
  outlookSchema,
  runSchema,
  spanQuerySchema,
  summarySchema,
  traceQuerySchema,
  traceSchema,
  trendSchema,
} from '@/shared/schemas'
import { operation } from '../operation'
import { byId } from './vessels'

const tag = 'Reading'
const read = { method: 'get', tag, access: 'signed-in' } as const

export const listNights = operation({
  ...read,
  path: '/api/nights',
  summary: 'The last nights of the systems in view: quiet hours, runs by themselves, flushes',
  query: nightsQuerySchema,
  output: nightsSchema,
})

export const getSummary = operation({
  ...read,
  path: '/api/systems/{id}/summary',
  summary: 'State, leak rate and hold time of a system as of an instant',
  params: byId,
  query: atQuerySchema,
  output: summarySchema,
})

export const listRuns = operation({
  ...read,
  path: '/api/systems/{id}/runs',
  summary: 'Runs of the pump, ascending; those after a flush belong to the full record',
  params: byId,
  query: spanQuerySchema,
  output: listOf(runSchema),
})

export const listHolds = operation({
  ...read,
  path: '/api/systems/{id}/holds',
  summary: 'Holds, ascending; those with a flush in them belong to the full record',
  params: byId,
  query: spanQuerySchema,
  output: listOf(holdSchema),
})

export const getTrace = operation({
  ...read,
  path: '/api/systems/{id}/trace',
  summary: 'The record in at most so many buckets, extremes kept; needs the full record',
  params: byId,
  query: traceQuerySchema,
  output: traceSchema,
})

export const getOutlook = operation({
  ...read,
  path: '/api/systems/{id}/outlook',
  summary: 'What the coming night, or the one under way, brings',
  params: byId,
  query: atQuerySchema,
  output: outlookSchema,
})

export const getTrend = operation({
  ...read,
  path: '/api/systems/{id}/trend',
  summary: 'Where the leak rate is going over weeks, and its steps',
  params: byId,
  query: spanQuerySchema.pick({ from: true, to: true, at: true }),
  output: trendSchema,
})

export const getComparison = operation({
  ...read,
  path: '/api/systems/{id}/comparison',
  summary: 'Before and after a visit, or any two spans',
  params: byId,
  query: comparisonQuerySchema,
  output: comparisonSchema,
})

export const readingOperations = [
  listNights,
  getSummary,
  listRuns,
  listHolds,
  getTrace,
  getOutlook,
  getTrend,
  getComparison,
]
