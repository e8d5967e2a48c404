import { z } from 'zod'
import {
  changeCommissioningSchema,
  checkKindSchema,
  commissioningSchema,
  finishCommissioningSchema,
  fitLoggerSchema,
  fittedSchema,
  idSchema,
  listOf,
  liveReadingsSchema,
  loggerHealthSchema,
  pageQuerySchema,
  startCommissioningSchema,
  stepCheckSchema,
} from '@/shared/schemas'
import { operation } from '../operation'
import { byId } from './vessels'

const tag = 'Commissioning'

export const listCommissionings = operation({
  method: 'get',
  path: '/api/commissionings',
  summary: 'Commissionings not signed off, the newest first',
  tag,
  access: 'signed-in',
  query: pageQuerySchema,
  output: listOf(commissioningSchema),
})

export const startCommissioning = operation({
  method: 'post',
  path: '/api/commissionings',
  summary: 'Begin to register a logger, by the code it shows or by its serial',
  tag,
  access: 'signed-in',
  body: startCommissioningSchema,
  output: commissioningSchema,
  status: 201,
})

export const getCommissioning = operation({
  method: 'get',
  path: '/api/commissionings/{id}',
  summary: 'A commissioning with every attempt at its checks',
  tag,
  access: 'signed-in',
  params: byId,
  output: commissioningSchema,
})

export const changeCommissioning = operation({
  method: 'patch',
  path: '/api/commissionings/{id}',
  summary: 'Choose the system, take a newer code, put aside or take up again',
  tag,
  access: 'signed-in',
  params: byId,
  body: changeCommissioningSchema,
  output: commissioningSchema,
})

export const fitLogger = operation({
  method: 'post',
  path: '/api/commissionings/{id}/fitting',
  summary: 'Fit the logger to the chosen system; a key is shown this once',
  tag,
  access: 'signed-in',
  params: byId,
  body: fitLoggerSchema,
  output: fittedSchema,
  status: 201,
})

export const stepCheck = operation({
  method: 'post',
  path: '/api/commissionings/{id}/checks/{kind}',
  summary: 'Begin a check, conclude it, or leave it out with a reason; the server decides what it shows',
  tag,
  access: 'signed-in',
  params: z.object({ id: idSchema, kind: checkKindSchema }),
  body: stepCheckSchema,
  output: commissioningSchema,
})

export const liveReadings = operation({
  method: 'get',
  path: '/api/commissionings/{id}/live',
  summary: 'What the logger sends while it is being fitted',
  tag,
  access: 'signed-in',
  params: byId,
  output: liveReadingsSchema,
})

export const finishCommissioning = operation({
  method: 'post',
  path: '/api/commissionings/{id}/finish',
  summary: 'Sign a commissioning off',
  tag,
  access: 'signed-in',
  params: byId,
  body: finishCommissioningSchema,
  output: commissioningSchema,
})

export const getLoggerCommissioning = operation({
  method: 'get',
  path: '/api/loggers/{id}/commissioning',
  summary: 'The commissioning record of a logger',
  tag,
  access: 'signed-in',
  params: byId,
  output: commissioningSchema,
})

export const listLoggerHealth = operation({
  method: 'get',
  path: '/api/loggers/health',
  summary: 'Supply voltage of one’s loggers and what they are judged by',
  tag,
  access: 'signed-in',
  query: pageQuerySchema,
  output: listOf(loggerHealthSchema),
})

export const commissioningOperations = [
  listCommissionings,
  startCommissioning,
  getCommissioning,
  changeCommissioning,
  fitLogger,
  stepCheck,
  liveReadings,
  finishCommissioning,
  getLoggerCommissioning,
  listLoggerHealth,
]
