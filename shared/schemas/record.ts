import { z } from 'zod'
import { idSchema, instantSchema, interval95, queryInstantSchema } from './common'
import { endingSchema, triggerSchema } from './words'

/** GET /api/systems/{id}/runs; one still on has a null end and its duration so far. */
export const runSchema = z.object({
  startedAt: instantSchema,
  stoppedAt: instantSchema.nullable(),
  durationSeconds: z.number(),
  trigger: triggerSchema,
  vacuumAtStartPa: z.number().nullable(),
  vacuumAtStopPa: z.number().nullable(),
  edgeUncertaintySeconds: z.number(),
  /** Over the band between cut-in and cut-out; null where it cannot be told. */
  rechargePaPerSecond: z.number().nullish(),
  /** While it ran; null where not measured. Belongs to the full record: a charged supply says somebody is about. */
  supplyV: z.number().nullish(),
})
export type Run = z.infer<typeof runSchema>

/** GET /api/systems/{id}/holds */
export const holdSchema = z.object({
  startedAt: instantSchema,
  endedAt: instantSchema.nullable(),
  durationSeconds: z.number(),
  ending: endingSchema,
  flushes: z.number().int(),
  leakRate: z.object({ paPerHour: z.number(), ...interval95 }).nullable(),
})
export type Hold = z.infer<typeof holdSchema>

/** Parallel arrays, one entry a bucket; a gap is one bucket of nulls at its first instant. */
export const traceChannelSchema = z.object({
  at: z.array(z.number().int()),
  min: z.array(z.number().nullable()),
  max: z.array(z.number().nullable()),
  mean: z.array(z.number().nullable()),
})
export type TraceChannel = z.infer<typeof traceChannelSchema>

export const traceQuerySchema = z
  .object({
    from: queryInstantSchema,
    to: queryInstantSchema,
    points: z.coerce.number().int().min(1).max(4000).default(1200),
  })
  .refine((query) => Date.parse(query.from) < Date.parse(query.to), 'from must be before to')

/** GET /api/systems/{id}/trace; instants in it are epoch milliseconds. */
export const traceSchema = z.object({
  resolutionSeconds: z.number(),
  channels: z.object({
    vacuum: traceChannelSchema.optional(),
    air: traceChannelSchema.optional(),
    barometer: traceChannelSchema.optional(),
    supply: traceChannelSchema.optional(),
  }),
  runs: z.array(
    z.object({
      startedAt: z.number().int(),
      stoppedAt: z.number().int().nullable(),
      trigger: triggerSchema,
    }),
  ),
  flushes: z.array(z.object({ at: z.number().int(), dropPa: z.number(), startedPump: z.boolean() })),
  /** Seconds to add to UTC for the boat's wall clock, each from an instant on. */
  offsets: z.array(z.object({ from: z.number().int(), seconds: z.number().int() })),
})
export type Trace = z.infer<typeof traceSchema>

export const nightsQuerySchema = z.object({
  systems: z
    .string()
    .transform((text) => text.split(',').filter((id) => id !== ''))
    .pipe(z.array(idSchema).min(1).max(500)),
  nights: z.coerce.number().int().min(1).max(31).default(7),
  at: queryInstantSchema.optional(),
})

/**
 * One evening to morning of a boat. `quiet`, `runs`, `flushes` count minutes after 18:00 of its wall clock;
 * `flushes` is empty for those without the full record; `more` = runs beyond those listed.
 */
export const nightSchema = z.object({
  date: z.string(),
  quiet: z.tuple([z.number(), z.number()]),
  runs: z.array(z.number()),
  flushes: z.array(z.number()),
  more: z.number().int(),
})
export type Night = z.infer<typeof nightSchema>
export const nightsSchema = z.object({
  items: z.array(z.object({ systemId: idSchema, nights: z.array(nightSchema) })),
})
export type Nights = z.infer<typeof nightsSchema>
