import {
  addGaugeTestSchema,
  askVisitSchema,
  changeVisitSchema,
  createdVisitSchema,
  doneSchema,
  listOf,
  partChangeSchema,
  visitEntrySchema,
  visitSchema,
  visitsQuerySchema,
  visitWholeSchema,
} from '@/shared/schemas'
import { operation } from '../operation'
import { byId } from './vessels'

const tag = 'Visits'

export const askVisit = operation({
  method: 'post',
  path: '/api/vessels/{id}/visits',
  summary: 'Ask a shop for a visit, or open one',
  tag,
  access: 'signed-in',
  params: byId,
  body: askVisitSchema,
  output: createdVisitSchema,
  status: 201,
})

export const listVisits = operation({
  method: 'get',
  path: '/api/visits',
  summary: 'Visits of one’s shops and own vessels, newest asked first',
  tag,
  access: 'signed-in',
  query: visitsQuerySchema,
  output: listOf(visitSchema),
})

export const getVisit = operation({
  method: 'get',
  path: '/api/visits/{id}',
  summary: 'A visit with its tests, entries, parts and reports',
  tag,
  access: 'signed-in',
  params: byId,
  output: visitWholeSchema,
})

export const changeVisit = operation({
  method: 'patch',
  path: '/api/visits/{id}',
  summary: 'Plan, assign, begin, finish or close a visit',
  tag,
  access: 'signed-in',
  params: byId,
  body: changeVisitSchema,
  output: visitSchema,
})

export const addGaugeTest = operation({
  method: 'post',
  path: '/api/visits/{id}/gauge-tests',
  summary: 'Enter a gauge test; the same id again is kept once',
  tag,
  access: 'signed-in',
  params: byId,
  body: addGaugeTestSchema,
  output: doneSchema,
})

export const addVisitEntry = operation({
  method: 'post',
  path: '/api/visits/{id}/entries',
  summary: 'Enter a check or a note; the same id again is kept once',
  tag,
  access: 'signed-in',
  params: byId,
  body: visitEntrySchema,
  output: doneSchema,
})

export const addPartChange = operation({
  method: 'post',
  path: '/api/visits/{id}/part-changes',
  summary: 'Enter what was done to a part; the same id again is kept once',
  tag,
  access: 'signed-in',
  params: byId,
  body: partChangeSchema,
  output: doneSchema,
})

export const visitOperations = [
  askVisit,
  listVisits,
  getVisit,
  changeVisit,
  addGaugeTest,
  addVisitEntry,
  addPartChange,
]
