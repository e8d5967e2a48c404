import { z } from 'zod'
import { idSchema, instantSchema } from './common'

/** A leak rate with its standard error, Pa/h; positive loses vacuum. */
const cupRateSchema = z.object({ paPerHour: z.number(), sigma: z.number().positive() })

export const cupVerdictSchema = z.enum(['seal', 'cleared', 'cannot-tell'])
export type CupVerdict = z.infer<typeof cupVerdictSchema>

/** A cup of water in one bowl, and what the leak did. */
export const cupTestSchema = z.object({
  id: idSchema,
  /** Of the drawing; null when the bowl was named by hand. */
  partKey: z.string().nullable(),
  headName: z.string(),
  waterAt: instantSchema,
  /** The first flush after the water; null = none yet. */
  flushedAt: instantSchema.nullable(),
  /** The water is still in, as far as the record knows. */
  open: z.boolean(),
  /** Null = not yet. */
  verdict: cupVerdictSchema.nullable(),
  sentence: z.string(),
  /** About how much longer nothing should be flushed; null when waiting longer does not help, or it is over. */
  minutesLeft: z.number().int().nullable(),
  before: cupRateSchema.nullable(),
  wet: cupRateSchema.nullable(),
  after: cupRateSchema.nullable(),
})
export type CupTestResult = z.infer<typeof cupTestSchema>

/** POST /api/systems/{id}/cup-tests: a head of the drawing, or a bowl's name. */
export const startCupTestSchema = z
  .object({
    partKey: z.string().min(1).max(64).optional(),
    name: z.string().trim().min(1).max(120).optional(),
    /** When the water went in; default now. */
    at: instantSchema.optional(),
  })
  .refine(
    (said) => (said.partKey === undefined) !== (said.name === undefined),
    'say one bowl, by its part or by a name',
  )
export type StartCupTest = z.infer<typeof startCupTestSchema>
