import { z } from 'zod'
import { idSchema, instantSchema, interval95, queryInstantSchema } from './common'
import { aboardSchema, causeSchema, repairVerdictSchema, stateSchema } from './words'

/** Pa/h over its legs; positive loses vacuum. */
export const leakRateSchema = z.object({
  paPerHour: z.number(),
  ...interval95,
  legs: z.number().int(),
  hours: z.number(),
  compensated: z.boolean(),
})
export type LeakRate = z.infer<typeof leakRateSchema>

/** With `at-least`, `seconds` is the bound and `high` null. */
export const holdTimeSchema = z.object({
  seconds: z.number(),
  ...interval95,
  bound: z.literal('at-least').nullable(),
  holds: z.number().int(),
})
export type HoldTime = z.infer<typeof holdTimeSchema>

/** GET /api/systems/{id}/summary */
export const summarySchema = z.object({
  at: instantSchema,
  state: stateSchema,
  since: instantSchema.nullable(),
  aboard: aboardSchema,
  leakRate: leakRateSchema.nullable(),
  holdTime: holdTimeSchema.nullable(),
  cutOutPa: z.number().nullable(),
  settledPa: z.number().nullable(),
  cutInPa: z.number().nullable(),
  recharge: z.object({ paPerSecond: z.number(), usualPaPerSecond: z.number().nullable() }).nullable(),
  cause: causeSchema.nullable(),
  current: z
    .object({
      at: instantSchema,
      vacuumPa: z.number().nullable(),
      pumpOn: z.boolean().nullable(),
      holdSoFarSeconds: z.number().nullable(),
    })
    .nullable(),
  lastHeardAt: instantSchema.nullable(),
})
export type Summary = z.infer<typeof summarySchema>

export const firstRunSchema = z.object({
  at: instantSchema.nullable(),
  earliest: instantSchema,
  latest: instantSchema.nullable(),
})

/** GET /api/systems/{id}/outlook */
export const outlookSchema = z.object({
  at: instantSchema,
  night: z.object({ from: instantSchema, to: instantSchema, timeZone: z.string(), hours: z.number() }),
  bedtime: instantSchema,
  chance: z.number().min(0).max(1).nullable(),
  chanceIfFlushedLast: z.number().min(0).max(1).nullable(),
  expectedRuns: z.number().nullable(),
  firstRun: firstRunSchema.nullable(),
  basis: z.enum(['phase-known', 'phase-open', 'learning']),
  aboard: aboardSchema,
})
export type Outlook = z.infer<typeof outlookSchema>

export const stepSchema = z.object({
  between: z.tuple([instantSchema, instantSchema]),
  fromPaPerHour: z.number(),
  toPaPerHour: z.number(),
  strength: z.number(),
})
export type Step = z.infer<typeof stepSchema>

/** GET /api/systems/{id}/trend; the slope is of the natural logarithm of the daily leak rate. */
export const trendSchema = z.object({
  slopePerDay: z.number().nullable(),
  doublingDays: z.number().nullable(),
  pValue: z.number().nullable(),
  limitCrossing: z
    .object({ at: instantSchema, low: instantSchema.nullable(), high: instantSchema.nullable() })
    .nullable(),
  steps: z.array(stepSchema),
})
export type Trend = z.infer<typeof trendSchema>

export const comparisonSideSchema = z.object({
  holds: z.number().int(),
  holdTimeSeconds: z.number().nullable(),
  leakRatePaPerHour: z.number().nullable(),
  rechargePaPerSecond: z.number().nullable(),
  differentialPa: z.number().nullable(),
  /** K = r/(R + r), leak flow over pump flow: the same whatever the gas space. */
  flowRatio: z.number().nullable(),
  runsPerDay: z.number().nullable(),
  pumpSecondsPerDay: z.number().nullable(),
  ampHoursPerDay: z.number().nullable(),
})
export type ComparisonSide = z.infer<typeof comparisonSideSchema>

/** GET /api/systems/{id}/comparison; the ratio is hold time after over before. */
export const comparisonSchema = z.object({
  before: comparisonSideSchema,
  after: comparisonSideSchema,
  ratio: z.object({ value: z.number(), ...interval95 }).nullable(),
  pValue: z.number().nullable(),
  verdict: repairVerdictSchema,
  hoursNeeded: z.number().nullable(),
  /** What else than the leak explains a changed hold time; null where nothing does. */
  because: z.enum(['gas-space', 'switch']).nullable(),
})
export type Comparison = z.infer<typeof comparisonSchema>

const spanTextSchema = z.string().transform((text, context) => {
  const [from, to, ...rest] = text.split('/').map((part) => queryInstantSchema.safeParse(part))
  if (from?.success && to?.success && rest.length === 0 && Date.parse(from.data) < Date.parse(to.data))
    return { from: from.data, to: to.data }
  context.addIssue({ code: 'custom', message: 'must be two instants, from/to, the earlier first' })
  return z.NEVER
})
export const comparisonQuerySchema = z
  .object({ before: spanTextSchema.optional(), after: spanTextSchema.optional(), visit: idSchema.optional() })
  .refine(
    (query) =>
      query.visit !== undefined
        ? query.before === undefined && query.after === undefined
        : query.before !== undefined && query.after !== undefined,
    'give before and after, or a visit',
  )
