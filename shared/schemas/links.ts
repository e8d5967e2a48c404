import { z } from 'zod'
import { idSchema, instantSchema } from './common'
import { noticeKindSchema } from './words'

/** The letters and digits after `/a/` in a message. */
export const linkCodeSchema = z.string().regex(/^[a-z0-9]{8,32}$/, 'is no link of ours')

/** GET /api/links/{code}: what a message tells, for whoever holds it. Changes nothing. */
export const linkedMessageSchema = z.object({
  notices: z.array(
    z.object({
      kind: noticeKindSchema,
      systemId: idSchema,
      vesselId: idSchema,
      vesselName: z.string(),
      systemName: z.string(),
      reason: z.string(),
      openedAt: instantSchema,
      closedAt: instantSchema.nullable(),
      acknowledgedAt: instantSchema.nullable(),
      snoozedUntil: instantSchema.nullable(),
    }),
  ),
})
export type LinkedMessage = z.infer<typeof linkedMessageSchema>

/** POST /api/links/{code}: acts in the name of the message's receiver. */
export const linkActSchema = z.object({
  word: z.enum(['OK', 'VISIT', 'MUTE', 'OFF', 'LAIDUP']),
  systemId: idSchema.optional(),
})
export const linkOutcomeSchema = z.object({ did: z.string(), sentence: z.string() })
export type LinkOutcome = z.infer<typeof linkOutcomeSchema>
