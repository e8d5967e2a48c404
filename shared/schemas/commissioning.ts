import { z } from 'zod'
import { idSchema, instantSchema } from './common'
import { serialSchema } from './loggers'
import { channelSchema, triggerSchema } from './words'

/**
 * How the logger comes by its key: it asks to be claimed and fetches it (RFC 8628), it is shown once to copy or scan,
 * or the logger is known and keeps the one it has.
 */
export const commissioningWaySchema = z.enum(['claim', 'key', 'known'])
export type CommissioningWay = z.infer<typeof commissioningWaySchema>

/** In the order in which they are done. */
export const checkKindSchema = z.enum([
  'first-reading',
  'leak-down-before',
  'zero',
  'two-point',
  'pump-channel',
  'breaker-off',
  'leak-down-after',
])
export type CheckKind = z.infer<typeof checkKindSchema>

export const checkOutcomeSchema = z.enum(['passed', 'failed', 'cannot-tell', 'left-out'])
export type CheckOutcome = z.infer<typeof checkOutcomeSchema>

/** One figure of a check, with what it is; a reader's unit is applied when shown. */
export const checkFigureSchema = z.object({
  name: z.string(),
  value: z.number().nullable(),
  unit: z.enum(['Pa', 'Pa/h', 's', 'ratio', 'count', 'V']),
  low: z.number().nullable().optional(),
  high: z.number().nullable().optional(),
})
export type CheckFigure = z.infer<typeof checkFigureSchema>

export const commissioningCheckSchema = z.object({
  kind: checkKindSchema,
  beganAt: instantSchema,
  doneAt: instantSchema.nullable(),
  doneBy: z.string().nullable(),
  outcome: checkOutcomeSchema.nullable(),
  figures: z.array(checkFigureSchema),
  /** What was found and, when it did not pass, what to try. */
  reason: z.string(),
})
export type CommissioningCheck = z.infer<typeof commissioningCheckSchema>

/** GET /api/commissionings/{id} */
export const commissioningSchema = z.object({
  id: idSchema,
  way: commissioningWaySchema,
  serial: z.string(),
  userCode: z.string().nullable(),
  startedAt: instantSchema,
  startedBy: z.string(),
  system: z
    .object({
      id: idSchema,
      name: z.string(),
      vesselId: idSchema,
      vesselName: z.string(),
      timeZone: z.string(),
      utcOffsetSeconds: z.number().int(),
      cutOutPa: z.number().nullable(),
      cutInPa: z.number().nullable(),
    })
    .nullable(),
  logger: z
    .object({ id: idSchema, intervalSeconds: z.number().int(), channels: z.array(channelSchema) })
    .nullable(),
  fittedAt: instantSchema.nullable(),
  setAsideAt: instantSchema.nullable(),
  finishedAt: instantSchema.nullable(),
  finishedBy: z.string().nullable(),
  passed: z.boolean().nullable(),
  note: z.string().nullable(),
  /** Kinds that this logger's channels allow, in order. */
  needed: z.array(checkKindSchema),
  /** Every attempt, oldest first. */
  checks: z.array(commissioningCheckSchema),
})
export type Commissioning = z.infer<typeof commissioningSchema>

/** POST /api/commissionings: a code that a logger shows, or a serial. */
export const startCommissioningSchema = z.union([
  z.object({
    way: z.literal('claim'),
    userCode: z.string().trim().min(4).max(20),
    systemId: idSchema.optional(),
  }),
  z.object({
    way: z.enum(['key', 'known']),
    serial: serialSchema,
    /** Where it goes, when that is known already. */
    systemId: idSchema.optional(),
  }),
])
export type StartCommissioning = z.infer<typeof startCommissioningSchema>

/** PATCH /api/commissionings/{id} */
export const changeCommissioningSchema = z.object({
  systemId: idSchema.optional(),
  userCode: z.string().trim().min(4).max(20).optional(),
  /** Put away without finishing, and taken up again. */
  setAside: z.boolean().optional(),
})
export type ChangeCommissioning = z.infer<typeof changeCommissioningSchema>

/** POST /api/commissionings/{id}/fitting */
export const fitLoggerSchema = z.object({
  intervalSeconds: z.number().int().min(1).max(3600).default(60),
  channels: z
    .array(channelSchema)
    .min(1)
    .refine((list) => new Set(list).size === list.length, 'a channel is named twice')
    .refine((list) => list.includes('pump') || list.includes('vacuum'), 'pump or vacuum must be among them')
    .default(['pump', 'vacuum']),
})
export type FitLogger = z.infer<typeof fitLoggerSchema>
/** The key only where it is shown to a person, and this once. */
export const fittedSchema = z.object({ loggerId: idSchema, key: z.string().nullable() })
export type Fitted = z.infer<typeof fittedSchema>

const gaugePaSchema = z.number().min(-20_000).max(101_325)
/** POST /api/commissionings/{id}/checks/{kind}: `begin`, then `done` with what the hand gauge said, or `leave-out`. */
export const stepCheckSchema = z.discriminatedUnion('step', [
  z.object({ step: z.literal('begin') }),
  z.object({
    step: z.literal('done'),
    /** Two-point: what the hand gauge reads now. */
    gaugePa: gaugePaSchema.optional(),
    resolutionPa: z.number().positive().max(5_000).optional(),
    /** Leak-down by hand, before fitting. */
    leakDown: z
      .object({ startPa: gaugePaSchema, endPa: gaugePaSchema, seconds: z.number().min(60).max(86_400) })
      .optional(),
  }),
  z.object({ step: z.literal('leave-out'), reason: z.string().trim().min(3).max(500) }),
])
export type StepCheck = z.infer<typeof stepCheckSchema>

/** POST /api/commissionings/{id}/finish */
export const finishCommissioningSchema = z.object({ note: z.string().trim().max(2000).optional() })

/** GET /api/commissionings/{id}/live: what the logger sends while it is being fitted. */
export const liveReadingsSchema = z.object({
  at: instantSchema,
  /** As read, not corrected; newest last, at most 120 of the last ten minutes. */
  readings: z.array(
    z.object({ at: instantSchema, vacuumPa: z.number().nullable(), pumpOn: z.boolean().nullable() }),
  ),
  /** The newest of each channel, vacuum corrected by what has been calibrated. */
  newest: z.object({
    at: instantSchema.nullable(),
    vacuumPa: z.number().nullable(),
    pumpOn: z.boolean().nullable(),
    airC: z.number().nullable(),
    barometerPa: z.number().nullable(),
    supplyV: z.number().nullable(),
  }),
  seen: z.array(channelSchema),
  lastHeardAt: instantSchema.nullable(),
  clockOffsetSeconds: z.number().nullable(),
  /** Since the check now under way began. */
  runs: z.array(
    z.object({ startedAt: instantSchema, stoppedAt: instantSchema.nullable(), trigger: triggerSchema }),
  ),
})
export type LiveReadings = z.infer<typeof liveReadingsSchema>

/** GET /api/loggers/health */
export const loggerHealthSchema = z.object({
  loggerId: idSchema,
  supplyV: z.number().nullable(),
  supplyAt: instantSchema.nullable(),
  lowSupplyV: z.number().nullable(),
  silenceSeconds: z.number().int().nullable(),
})
export type LoggerHealth = z.infer<typeof loggerHealthSchema>
