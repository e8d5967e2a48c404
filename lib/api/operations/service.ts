import { z } from 'zod'
import {
  healthSchema,
  isolationInputSchema,
  isolationSchema,
  leakDownInputSchema,
  leakDownSchema,
} from '@/shared/schemas'
import { operation } from '../operation'

export const leakDown = operation({
  method: 'post',
  path: '/api/leak-down',
  summary: 'What two readings of a gauge say: rate, hold time, verdict, hole',
  tag: 'Calculators',
  access: 'everybody',
  body: leakDownInputSchema,
  output: leakDownSchema,
})

export const isolation = operation({
  method: 'post',
  path: '/api/isolation',
  summary: 'What gauge tests say about where the air comes in, and what to test next',
  tag: 'Calculators',
  access: 'everybody',
  body: isolationInputSchema,
  output: isolationSchema,
})

export const getHealth = operation({
  method: 'get',
  path: '/api/health',
  summary: '200 only when ready',
  tag: 'Service',
  access: 'everybody',
  output: healthSchema,
})

export const getOpenApi = operation({
  method: 'get',
  path: '/api/openapi.json',
  summary: 'This document',
  tag: 'Service',
  access: 'everybody',
  output: z.record(z.string(), z.unknown()),
})

export const serviceOperations = [leakDown, isolation, getHealth, getOpenApi]
