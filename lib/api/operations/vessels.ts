import { z } from 'zod'
import {
  accessLevelSchema,
  changeSettingsSchema,
  changeVesselSchema,
  createdSystemSchema,
  createdVesselSchema,
  createVesselSchema,
  doneSchema,
  fleetRowSchema,
  idSchema,
  instantSchema,
  listOf,
  pageQuerySchema,
  setAboardSchema,
  setAccessSchema,
  setPartsSchema,
  setStatementSchema,
  setStatementsSchema,
  settingsSchema,
  statementValueSchema,
  systemInputSchema,
  vesselSchema,
} from '@/shared/schemas'
import { operation } from '../operation'

const tag = 'Vessels'
export const byId = z.object({ id: idSchema })
const aboardSaid = z.object({ value: z.boolean().nullable(), until: instantSchema.nullable() })
const statementSaid = z.object({ value: statementValueSchema.nullable(), until: instantSchema.nullable() })

export const listVessels = operation({
  method: 'get',
  path: '/api/vessels',
  summary: 'Fleet rows, one item a system, worst first',
  tag,
  access: 'signed-in',
  query: pageQuerySchema.extend({ vessel: idSchema.optional() }),
  output: listOf(fleetRowSchema),
})

export const createVessel = operation({
  method: 'post',
  path: '/api/vessels',
  summary: 'Set up a vessel with its first system; without an owner the creating shop keeps it',
  tag,
  access: 'signed-in',
  body: createVesselSchema,
  output: createdVesselSchema,
  status: 201,
})

export const getVessel = operation({
  method: 'get',
  path: '/api/vessels/{id}',
  summary: 'A vessel with its systems, parts, loggers and who may see it',
  tag,
  access: 'signed-in',
  params: byId,
  output: vesselSchema,
})

export const changeVessel = operation({
  method: 'patch',
  path: '/api/vessels/{id}',
  summary: 'Change its name, zone, berth or quiet hours',
  tag,
  access: 'signed-in',
  params: byId,
  body: changeVesselSchema,
  output: doneSchema,
})

export const setAboard = operation({
  method: 'put',
  path: '/api/vessels/{id}/aboard',
  summary: 'Say whether anybody is aboard; null takes the word back',
  tag,
  access: 'signed-in',
  params: byId,
  body: setAboardSchema,
  output: aboardSaid,
})

export const setAccess = operation({
  method: 'put',
  path: '/api/vessels/{id}/access/{shopId}',
  summary: 'Let a shop see the boat: leak figures, or the full record',
  tag,
  access: 'signed-in',
  params: z.object({ id: idSchema, shopId: idSchema }),
  body: setAccessSchema,
  output: z.object({ shopId: idSchema, level: accessLevelSchema }),
})

export const withdrawAccess = operation({
  method: 'delete',
  path: '/api/vessels/{id}/access/{shopId}',
  summary: 'Withdraw a shop’s sight of the boat, at once',
  tag,
  access: 'signed-in',
  params: z.object({ id: idSchema, shopId: idSchema }),
  output: doneSchema,
})

export const addSystem = operation({
  method: 'post',
  path: '/api/vessels/{id}/systems',
  summary: 'A further system on the same boat',
  tag,
  access: 'signed-in',
  params: byId,
  body: systemInputSchema,
  output: createdSystemSchema,
  status: 201,
})

export const getSettings = operation({
  method: 'get',
  path: '/api/systems/{id}/settings',
  summary: 'The figures of a system now in force',
  tag,
  access: 'signed-in',
  params: byId,
  output: settingsSchema,
})

export const changeSettings = operation({
  method: 'put',
  path: '/api/systems/{id}/settings',
  summary: 'Change figures of a system from a moment on; what is not named stays',
  tag,
  access: 'signed-in',
  params: byId,
  body: changeSettingsSchema,
  output: settingsSchema,
})

export const setParts = operation({
  method: 'put',
  path: '/api/systems/{id}/parts',
  summary: 'Draw the system anew as its parts',
  tag,
  access: 'signed-in',
  params: byId,
  body: setPartsSchema,
  output: doneSchema,
})

export const setStatement = operation({
  method: 'put',
  path: '/api/systems/{id}/statement',
  summary: 'Say that a system is off, laid up or being worked on; null takes it back',
  tag,
  access: 'signed-in',
  params: byId,
  body: setStatementSchema,
  output: statementSaid,
})

export const setStatements = operation({
  method: 'put',
  path: '/api/statements',
  summary: 'The same of many systems at once, for a lay-up',
  tag,
  access: 'signed-in',
  body: setStatementsSchema,
  output: statementSaid,
})

export const vesselOperations = [
  listVessels,
  createVessel,
  getVessel,
  changeVessel,
  setAboard,
  setAccess,
  withdrawAccess,
  addSystem,
  getSettings,
  changeSettings,
  setParts,
  setStatement,
  setStatements,
]
