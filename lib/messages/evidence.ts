import { z } from 'zod'

/** What a night warning rests on, with the boat's own clock as text: enough to write the message years later. */
export const nightEvidenceSchema = z.object({
  quiet: z.object({ from: z.string(), to: z.string() }),
  /** Wall clock of quiet hours, bedtime and runs, `22:00`. */
  local: z.object({
    from: z.string(),
    to: z.string(),
    bedtime: z.string(),
    /** First run where the phase is known, and first run after a last flush at bedtime. */
    firstAt: z.string().nullable(),
    firstAfterBedtime: z.string().nullable(),
  }),
  chance: z.number().nullable(),
  chanceIfFlushedLast: z.number(),
  expectedRuns: z.number(),
  expectedRunsIfFlushedLast: z.number().nullable(),
  holdSeconds: z.number().nullable(),
  heardAtLocal: z.string().nullable(),
  /** Minutes after 18:00 of the boat's clock: what the night strip draws. */
  strip: z.object({ quiet: z.tuple([z.number(), z.number()]), expected: z.array(z.number()) }),
})
export type NightEvidence = z.infer<typeof nightEvidenceSchema>

/** Figures behind the other kinds; each kind fills what it has. */
export const recordEvidenceSchema = z
  .object({
    holdSeconds: z.number().nullable(),
    holdLowSeconds: z.number().nullable(),
    holdHighSeconds: z.number().nullable(),
    limitSeconds: z.number().nullable(),
    holds: z.number().nullable(),
    ratePaPerHour: z.number().nullable(),
    fromPaPerHour: z.number().nullable(),
    toPaPerHour: z.number().nullable(),
    rechargePaPerSecond: z.number().nullable(),
    usualRechargePaPerSecond: z.number().nullable(),
    cutOutPa: z.number().nullable(),
    cutInPa: z.number().nullable(),
    differentialPa: z.number().nullable(),
    usualDifferentialPa: z.number().nullable(),
    supplyV: z.number().nullable(),
    lowSupplyV: z.number().nullable(),
    airC: z.number().nullable(),
    sinceAt: z.string().nullable(),
    sinceLocal: z.string().nullable(),
    untilLocal: z.string().nullable(),
    fault: z.string().nullable(),
    loggers: z.number(),
    harbour: z.string().nullable(),
  })
  .partial()
export type RecordEvidence = z.infer<typeof recordEvidenceSchema>
