import { z } from 'zod'
// Sets zod to work without compiling functions, which the pages' security policy refuses.
import '@/shared/schemas/common'
import type { HoldTime } from '@/shared/schemas'

const stripSchema = z.object({
  strip: z.object({ quiet: z.tuple([z.number(), z.number()]), expected: z.array(z.number()) }),
})
const holdSchema = z.object({
  holdSeconds: z.number().positive(),
  holdLowSeconds: z.number().nullish(),
  holdHighSeconds: z.number().nullish(),
  limitSeconds: z.number().positive().nullish(),
})

/** The night a warning foretold, where the evidence draws one. */
export const stripEvidence = (evidence: Record<string, unknown>) =>
  stripSchema.safeParse(evidence).data?.strip ?? null

/** The hold time a notice rests on, with the limit it is held to. */
export function holdEvidence(
  evidence: Record<string, unknown>,
): { holdTime: HoldTime; limitSeconds: number } | null {
  const found = holdSchema.safeParse(evidence).data
  if (found === undefined) return null
  return {
    holdTime: {
      seconds: found.holdSeconds,
      low: found.holdLowSeconds ?? null,
      high: found.holdHighSeconds ?? null,
      bound: null,
      holds: 0,
    },
    limitSeconds: found.limitSeconds ?? 10_800,
  }
}
