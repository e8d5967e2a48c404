import { z } from 'zod'
import {
  atQuerySchema,
  cupTestSchema,
  doneSchema,
  idSchema,
  listOf,
  startCupTestSchema,
} from '@/shared/schemas'
import { operation } from '../operation'
import { byId } from './vessels'

const own = { tag: 'Reading', access: 'signed-in' } as const

export const listCupTests = operation({
  ...own,
  method: 'get',
  path: '/api/systems/{id}/cup-tests',
  summary: 'The newest cup tests and what the leak did, the newest first; needs the full record',
  params: byId,
  query: atQuerySchema,
  output: listOf(cupTestSchema),
})

export const startCupTest = operation({
  ...own,
  method: 'post',
  path: '/api/systems/{id}/cup-tests',
  summary: 'A cup of water went into one bowl; one cup test at a time',
  params: byId,
  body: startCupTestSchema,
  output: cupTestSchema,
  status: 201,
})

export const takeBackCupTest = operation({
  ...own,
  method: 'delete',
  path: '/api/systems/{id}/cup-tests/{testId}',
  summary: 'Take a cup test back',
  params: z.object({ id: idSchema, testId: idSchema }),
  output: doneSchema,
})

export const cupTestOperations = [listCupTests, startCupTest, takeBackCupTest]
