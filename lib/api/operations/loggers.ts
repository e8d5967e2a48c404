import { z } from 'zod'
import {
  answerClaimSchema,
  answeredClaimSchema,
  calibrateSchema,
  claimSchema,
  deviceAuthorizationSchema,
  deviceTokenSchema,
  doneSchema,
  idSchema,
  listOf,
  loggerKeySchema,
  loggerSchema,
  pageQuerySchema,
  registerLoggerSchema,
  watchedSchema,
  watchSchema,
} from '@/shared/schemas'
import { operation } from '../operation'
import { byId } from './vessels'

const tag = 'Loggers'

export const listLoggers = operation({
  method: 'get',
  path: '/api/loggers',
  summary: 'Loggers of one’s shops and vessels, by serial',
  tag,
  access: 'signed-in',
  query: pageQuerySchema.extend({ system: idSchema.optional() }),
  output: listOf(loggerSchema),
})

export const registerLogger = operation({
  method: 'post',
  path: '/api/systems/{id}/loggers',
  summary: 'Register a logger and fit it to a system; the key is shown this once',
  tag,
  access: 'signed-in',
  params: byId,
  body: registerLoggerSchema,
  output: loggerKeySchema,
  status: 201,
})

export const rollKey = operation({
  method: 'post',
  path: '/api/loggers/{id}/key',
  summary: 'Give a logger a new key; the old one is void at once',
  tag,
  access: 'signed-in',
  params: byId,
  output: loggerKeySchema,
})

export const retireLogger = operation({
  method: 'delete',
  path: '/api/loggers/{id}',
  summary: 'Retire a logger; what it measured stays',
  tag,
  access: 'signed-in',
  params: byId,
  output: doneSchema,
})

export const calibrateLogger = operation({
  method: 'post',
  path: '/api/loggers/{id}/calibrations',
  summary: 'Correct a logger’s vacuum from a moment on: (as read − offset) × gain',
  tag,
  access: 'signed-in',
  params: byId,
  body: calibrateSchema,
  output: doneSchema,
})

export const watchLogger = operation({
  method: 'post',
  path: '/api/loggers/{id}/watch',
  summary: 'Ask for a finer rhythm while somebody watches',
  tag,
  access: 'signed-in',
  params: byId,
  body: watchSchema,
  output: watchedSchema,
})

const byCode = z.object({ userCode: z.string().min(4).max(20) })

export const getClaim = operation({
  method: 'get',
  path: '/api/claims/{userCode}',
  summary: 'What asks to be claimed with this code',
  tag,
  access: 'signed-in',
  params: byCode,
  output: claimSchema,
})

export const answerClaim = operation({
  method: 'post',
  path: '/api/claims/{userCode}',
  summary: 'Grant a logger its key for a system, or refuse it',
  tag,
  access: 'signed-in',
  params: byCode,
  body: answerClaimSchema,
  output: answeredClaimSchema,
})

export const authorizeDevice = operation({
  method: 'post',
  path: '/api/device_authorization',
  summary: 'RFC 8628: a logger asks to be claimed',
  tag,
  access: 'everybody',
  form: z.object({ client_id: z.string() }),
  output: deviceAuthorizationSchema,
})

export const deviceToken = operation({
  method: 'post',
  path: '/api/token',
  summary: 'RFC 8628: the logger polls for its key',
  tag,
  access: 'everybody',
  form: z.object({ grant_type: z.string(), device_code: z.string(), client_id: z.string() }),
  output: deviceTokenSchema,
})

export const loggerOperations = [
  listLoggers,
  registerLogger,
  rollKey,
  retireLogger,
  calibrateLogger,
  watchLogger,
  getClaim,
  answerClaim,
  authorizeDevice,
  deviceToken,
]
