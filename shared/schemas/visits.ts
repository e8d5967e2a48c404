import { z } from 'zod'
import { idSchema, instantSchema, pageQuerySchema } from './common'
import { repairVerdictSchema, visitStatusSchema } from './words'

/** POST /api/vessels/{id}/visits: ask for a visit. The shop may be left out when only one has access. */
export const askVisitSchema = z.object({
  complaint: z.string().trim().max(4000).default(''),
  systemId: idSchema.optional(),
  shopId: idSchema.optional(),
})
export type AskVisit = z.infer<typeof askVisitSchema>
export const createdVisitSchema = z.object({ id: idSchema })

export const visitSchema = z.object({
  id: idSchema,
  vesselId: idSchema,
  vesselName: z.string(),
  systemId: idSchema.nullable(),
  systemName: z.string().nullable(),
  shopId: idSchema,
  shopName: z.string(),
  status: visitStatusSchema,
  complaint: z.string(),
  askedBy: z.string().nullable(),
  askedAt: instantSchema,
  plannedFor: instantSchema.nullable(),
  assignedTo: z.object({ id: idSchema, name: z.string() }).nullable(),
  startedAt: instantSchema.nullable(),
  finishedAt: instantSchema.nullable(),
  closedAt: instantSchema.nullable(),
  verdict: repairVerdictSchema.nullable(),
  summary: z.string().nullable(),
})
export type Visit = z.infer<typeof visitSchema>
export const visitsQuerySchema = pageQuerySchema.extend({
  status: visitStatusSchema.optional(),
  vessel: idSchema.optional(),
})

/** PATCH /api/visits/{id}. Times default to now when the status asks for one. */
export const changeVisitSchema = z.object({
  status: visitStatusSchema.optional(),
  complaint: z.string().trim().max(4000).optional(),
  systemId: idSchema.optional(),
  plannedFor: instantSchema.nullable().optional(),
  assignedTo: idSchema.nullable().optional(),
  startedAt: instantSchema.optional(),
  finishedAt: instantSchema.optional(),
  verdict: repairVerdictSchema.nullable().optional(),
  summary: z.string().trim().max(8000).nullable().optional(),
})
export type ChangeVisit = z.infer<typeof changeVisitSchema>

/** Ids of entries are made by the phone (UUID), so that what is sent twice is kept once. */
export const gaugeTestSchema = z.object({
  id: z.uuid(),
  startedAt: instantSchema,
  endedAt: instantSchema,
  partKeys: z.array(z.string().min(1).max(64)).min(1).max(64),
  startPa: z.number().min(-20_000).max(110_000),
  endPa: z.number().min(-20_000).max(110_000),
  resolutionPa: z.number().positive().nullable().optional(),
  airStartCel: z.number().nullable().optional(),
  airEndCel: z.number().nullable().optional(),
  barometerStartPa: z.number().nullable().optional(),
  barometerEndPa: z.number().nullable().optional(),
})
export type GaugeTest = z.infer<typeof gaugeTestSchema>
/** POST /api/visits/{id}/gauge-tests */
export const addGaugeTestSchema = gaugeTestSchema.refine(
  (test) => Date.parse(test.endedAt) > Date.parse(test.startedAt),
  'the end must be after the start',
)

export const visitEntrySchema = z.object({
  id: z.uuid(),
  at: instantSchema,
  kind: z.string().min(1).max(64),
  body: z.record(z.string(), z.unknown()),
})
export type VisitEntry = z.infer<typeof visitEntrySchema>

export const partChangeSchema = z.object({
  id: z.uuid(),
  partKey: z.string().min(1).max(64),
  at: instantSchema,
  action: z.enum(['cleaned', 'tightened', 'adjusted', 'replaced']),
  detail: z.string().trim().max(2000).nullable().optional(),
})
export type PartChange = z.infer<typeof partChangeSchema>

export const photoSchema = z.object({
  id: z.uuid(),
  at: instantSchema,
  mediaType: z.enum(['image/jpeg', 'image/png', 'image/webp']),
  caption: z.string().nullable(),
})

export const reportVersionSchema = z.object({
  version: z.number().int(),
  madeAt: instantSchema,
  signedAt: instantSchema.nullable(),
  signedBy: z.string().nullable(),
})

/** GET /api/visits/{id} */
export const visitWholeSchema = visitSchema.extend({
  gaugeTests: z.array(gaugeTestSchema),
  entries: z.array(visitEntrySchema),
  partChanges: z.array(partChangeSchema),
  photos: z.array(photoSchema),
  reports: z.array(reportVersionSchema),
})
export type VisitWhole = z.infer<typeof visitWholeSchema>
