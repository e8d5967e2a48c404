import { z } from 'zod'

// Zod compiles schemas with `new Function`, which the content security policy of the pages refuses.
if (typeof window !== 'undefined') z.config({ jitless: true })

/** Ids are strings on the wire, whole numbers in the database. */
export const idSchema = z.string().regex(/^[1-9]\d{0,17}$/, 'is not an id')
/** RFC 3339, any offset when sent, UTC when answered. */
export const instantSchema = z.iso.datetime({ offset: true })
/** A calendar date of the boat's zone, `2026-12-01`. */
export const dateSchema = z.iso.date()
/** Wall-clock time of the boat's zone, `22:00`. */
export const wallTimeSchema = z.string().regex(/^([01]\d|2[0-3]):[0-5]\d$/, 'must look like 22:00')

export const quietHoursSchema = z
  .object({ start: wallTimeSchema, end: wallTimeSchema })
  .refine((hours) => hours.start !== hours.end, 'start and end must differ')
export type QuietHours = z.infer<typeof quietHoursSchema>

/** Wraps items as every list is answered: `next` is the cursor of the following page, null at the end. */
export const listOf = <T extends z.ZodType>(item: T) =>
  z.object({ items: z.array(item), next: z.string().nullable() })
export type List<T> = { items: T[]; next: string | null }

export const DEFAULT_LIMIT = 200
export const MAX_LIMIT = 5000
/** In a query string a `+` arrives as a space; an offset such as `+02:00` is read all the same. */
export const queryInstantSchema = z.preprocess(
  (value) => (typeof value === 'string' ? value.replace(/ (?=\d\d:\d\d$)/, '+') : value),
  instantSchema,
)
export const pageQuerySchema = z.object({
  limit: z.coerce.number().int().min(1).max(MAX_LIMIT).default(DEFAULT_LIMIT),
  cursor: z.string().max(200).optional(),
})
export const spanQuerySchema = pageQuerySchema.extend({
  from: queryInstantSchema.optional(),
  to: queryInstantSchema.optional(),
  /** As of then: only what was known at that instant. */
  at: queryInstantSchema.optional(),
})
export type SpanQuery = z.output<typeof spanQuerySchema>
export const atQuerySchema = z.object({ at: queryInstantSchema.optional() })

/** RFC 9457. `type` is stable; `detail` is a sentence a person can act on. */
export const problemSchema = z.object({
  type: z.string(),
  title: z.string(),
  status: z.number().int(),
  detail: z.string().optional(),
  errors: z.array(z.object({ path: z.string(), message: z.string() })).optional(),
})
export type Problem = z.infer<typeof problemSchema>

/** A value with its 95 % interval; null = unbounded on that side. */
export const interval95 = { low: z.number().nullable(), high: z.number().nullable() }

export const doneSchema = z.object({ done: z.literal(true) })
