import { z } from 'zod'
import { instantSchema } from './common'
import { partKindSchema } from './words'

/** Families of parts and causes that the record can point at. */
export const suspectFamilySchema = z.enum([
  'bowl-valve',
  'bowl-seal',
  'check-valve',
  'fixed-fitting',
  'hose-or-clamp',
  'switch',
  'pump',
  'supply',
  'gas-space',
  'handled',
])
export type SuspectFamily = z.infer<typeof suspectFamilySchema>

export const suspectSchema = z.object({
  family: suspectFamilySchema,
  /** Factor on the chance that its parts have before any test; over 1 likelier, under 1 less likely. */
  strength: z.number().positive(),
  basis: z.array(z.string()),
  overturnedBy: z.array(z.string()),
  /** Where its parts sit; none = not a part that a plug can find. */
  parts: z.array(partKindSchema),
})
export type Suspect = z.infer<typeof suspectSchema>

/** GET /api/systems/{id}/suspects; `from` is where the record looked at begins. */
export const suspectsSchema = z.object({
  at: instantSchema,
  from: instantSchema,
  verdict: z.enum(['named', 'nobody', 'not-enough']),
  /** The likeliest first, three at most. */
  suspects: z.array(suspectSchema).max(3),
  cleared: z.array(suspectSchema),
  notEnough: z.array(z.object({ signature: z.string(), missing: z.string() })),
  inseparable: z.array(z.string()),
  /** For the isolation, by part key; a part that nothing names is left out and stands at 1. */
  priorFactors: z.record(z.string(), z.number().positive()),
})
export type Suspects = z.infer<typeof suspectsSchema>

/** GET /api/outlook-score: how the nights foretold came out. Brier scores lie between 0 (never wrong) and 1. */
export const outlookScoreSchema = z.object({
  from: instantSchema,
  to: instantSchema,
  /** Nights that were heard and scored. */
  nights: z.number().int(),
  outcomes: z.object({
    hit: z.number().int(),
    false: z.number().int(),
    missed: z.number().int(),
    quiet: z.number().int(),
  }),
  /** Of the chance as it comes, over `rated` nights; null without any. */
  brier: z.number().min(0).max(1).nullable(),
  /** What always foretelling the share of nights that ran would have scored. */
  baseRateBrier: z.number().min(0).max(1).nullable(),
  rated: z.number().int(),
})
export type OutlookScore = z.infer<typeof outlookScoreSchema>
