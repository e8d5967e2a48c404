import { z } from 'zod'
import { interval95 } from './common'
import { leakDownVerdictSchema, partKindSchema } from './words'

const vacuumSchema = z.number().min(-20_000).max(110_000)
const weatherInput = {
  airStartCel: z.number().min(-40).max(85).optional(),
  airEndCel: z.number().min(-40).max(85).optional(),
  barometerStartPa: z.number().min(50_000).max(110_000).optional(),
  barometerEndPa: z.number().min(50_000).max(110_000).optional(),
}
const readingInput = {
  startPa: vacuumSchema,
  endPa: vacuumSchema,
  seconds: z.number().positive().max(31_536_000),
  resolutionPa: z.number().positive().max(50_000).optional(),
}

/** POST /api/leak-down */
export const leakDownInputSchema = z.object({
  ...readingInput,
  volumeM3: z.number().positive().max(100).optional(),
  differentialPa: z.number().positive().max(101_325).optional(),
  ...weatherInput,
})
export type LeakDownInput = z.infer<typeof leakDownInputSchema>
export const leakDownSchema = z.object({
  /** As read, not corrected. */
  paPerHour: z.number(),
  compensatedPaPerHour: z.number().nullable(),
  ...interval95,
  holdSeconds: z.number().nullable(),
  verdict: leakDownVerdictSchema,
  moreMinutes: z.number().nullable(),
  flowPaM3PerS: z.number().nullable(),
  holeDiameterM: z.number().nullable(),
})
export type LeakDown = z.infer<typeof leakDownSchema>

const keysSchema = z.array(z.string().min(1).max(64)).min(1).max(64)
/** POST /api/isolation */
export const isolationInputSchema = z
  .object({
    parts: z
      .array(
        z.object({
          key: z.string().min(1).max(64),
          kind: partKindSchema,
          volumeM3: z.number().min(0).max(100),
        }),
      )
      .min(1)
      .max(64),
    tests: z.array(z.object({ parts: keysSchema, ...readingInput, ...weatherInput })).max(200),
    possible: z
      .array(z.object({ parts: keysSchema, minutes: z.number().positive().max(1440) }))
      .max(200)
      .optional(),
  })
  .superRefine((input, context) => {
    const keys = new Set(input.parts.map((part) => part.key))
    if (keys.size < input.parts.length)
      context.addIssue({ code: 'custom', path: ['parts'], message: 'two parts have the same key' })
    const check = (list: { parts: string[] }[], name: string) =>
      list.forEach((entry, index) => {
        if (entry.parts.some((key) => !keys.has(key)))
          context.addIssue({ code: 'custom', path: [name, index, 'parts'], message: 'names an unknown part' })
      })
    check(input.tests, 'tests')
    check(input.possible ?? [], 'possible')
  })
export type IsolationInput = z.infer<typeof isolationInputSchema>
export const isolationSchema = z.object({
  shares: z.array(
    z.object({ key: z.string(), flowPaM3PerS: z.number(), ...interval95, share: z.number().nullable() }),
  ),
  suspects: z.array(z.object({ key: z.string(), probability: z.number() })),
  inseparable: z.array(z.array(z.string())),
  contradictions: z.array(z.object({ tests: z.array(z.number().int()), repeat: z.number().int() })),
  next: z.object({ parts: z.array(z.string()), why: z.string(), minutes: z.number() }).nullable(),
})
export type Isolation = z.infer<typeof isolationSchema>
