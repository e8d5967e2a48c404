import { z } from 'zod'
import { idSchema, instantSchema } from './common'

/** GET /api/time-zones: names that the database's zone data hold, with the offset that is theirs now. */
export const timeZonesQuerySchema = z.object({
  search: z.string().trim().max(64).default(''),
  limit: z.coerce.number().int().min(1).max(1000).default(50),
})
export const knownZoneSchema = z.object({ name: z.string(), utcOffsetSeconds: z.number().int() })
export type KnownZone = z.infer<typeof knownZoneSchema>

/** Where a test can be made on this system, and which of its parts are then in the test. */
export const testPointSchema = z.object({
  kind: z.string(),
  what: z.string(),
  /** Key of the part it is made at; null where it is the whole boat's or the tank's. */
  at: z.string().nullable(),
  parts: z.array(z.string()),
  drawnBy: z.string(),
  switchSees: z.boolean(),
  minutes: z.number(),
  tools: z.array(z.string()),
  cleared: z.string(),
})
export type TestPoint = z.infer<typeof testPointSchema>

const changedValueSchema = z.union([z.string(), z.number(), z.null()])
export const setUpChangeSchema = z.object({
  /** Name of the figure in the data, or of what changed of a part: `part`, `kind`, `name`, `volumeM3`, `parent`. */
  field: z.string(),
  /** Name of the part that it is about; null for figures. */
  part: z.string().nullable(),
  /** Left out where what it was before was not written down. */
  from: changedValueSchema.optional(),
  to: changedValueSchema,
})
export type SetUpChange = z.infer<typeof setUpChangeSchema>

export const setUpEntrySchema = z.object({
  id: idSchema,
  at: instantSchema,
  /** Null for somebody whom the reader doesn't know. */
  who: z.string().nullable(),
  subject: z.enum(['figures', 'parts', 'boat']),
  /** Figures alone: what they count from; null where that is the time of the change itself. */
  inForceFrom: instantSchema.nullable(),
  changes: z.array(setUpChangeSchema),
})
export type SetUpEntry = z.infer<typeof setUpEntrySchema>

/** GET /api/systems/{id}/set-up: what follows from the drawing, and what was changed by whom. */
export const setUpSchema = z.object({
  testPoints: z.array(testPointSchema),
  /** The newest first, the last hundred. */
  history: z.array(setUpEntrySchema),
  /** Seconds to add to UTC for the boat's clock over the last two years, for days that a change counts from. */
  offsets: z.array(z.object({ from: instantSchema, seconds: z.number().int() })),
})
export type SetUp = z.infer<typeof setUpSchema>
