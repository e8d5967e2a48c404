import { z } from 'zod'
import { idSchema, instantSchema } from './common'
import { channelSchema } from './words'

export const serialSchema = z
  .string()
  .regex(/^[A-Za-z0-9][A-Za-z0-9._-]{1,63}$/, 'may hold letters, digits, dot, dash and underscore')
const channelsSchema = z
  .array(channelSchema)
  .min(1)
  .refine((channels) => new Set(channels).size === channels.length, 'a channel is named twice')
  .refine(
    (channels) => channels.includes('pump') || channels.includes('vacuum'),
    'pump or vacuum must be among them',
  )

/** POST /api/systems/{systemId}/loggers */
export const registerLoggerSchema = z.object({
  serial: serialSchema,
  intervalSeconds: z.number().int().min(1).max(3600),
  channels: channelsSchema,
  /** Default: now. */
  fittedAt: instantSchema.optional(),
})
export type RegisterLogger = z.infer<typeof registerLoggerSchema>
/** The key is shown this once; only its hash is kept. */
export const loggerKeySchema = z.object({ id: idSchema, key: z.string() })
export type LoggerKey = z.infer<typeof loggerKeySchema>

/** GET /api/loggers */
export const loggerSchema = z.object({
  id: idSchema,
  serial: z.string(),
  shopId: idSchema.nullable(),
  intervalSeconds: z.number().int(),
  channels: z.array(channelSchema),
  keyMadeAt: instantSchema.nullable(),
  retiredAt: instantSchema.nullable(),
  lastHeardAt: instantSchema.nullable(),
  clockOffsetSeconds: z.number().nullable(),
  fitted: z
    .object({
      vesselId: idSchema,
      vesselName: z.string(),
      systemId: idSchema,
      systemName: z.string(),
      since: instantSchema,
    })
    .nullable(),
})
export type Logger = z.infer<typeof loggerSchema>

/** POST /api/loggers/{id}/calibrations: measured vacuum becomes (as read − offset) × gain. */
export const calibrateSchema = z.object({
  vacuumOffsetPa: z.number().min(-50_000).max(50_000),
  vacuumGain: z.number().min(0.5).max(2).default(1),
  inForceFrom: instantSchema.optional(),
})

/** POST /api/loggers/{id}/watch: asks for a finer rhythm while somebody watches. */
export const watchSchema = z.object({
  intervalSeconds: z.number().int().min(1).max(60).default(1),
  minutes: z.number().int().min(1).max(120).default(15),
})
export const watchedSchema = z.object({ intervalSeconds: z.number().int(), until: instantSchema })

/** GET /api/claims/{userCode}: what asks to be claimed. */
export const claimSchema = z.object({ userCode: z.string(), serial: z.string(), expiresAt: instantSchema })
export type Claim = z.infer<typeof claimSchema>
/** POST /api/claims/{userCode} */
export const answerClaimSchema = z.discriminatedUnion('answer', [
  z.object({
    answer: z.literal('approve'),
    systemId: idSchema,
    intervalSeconds: z.number().int().min(1).max(3600).default(60),
    channels: channelsSchema.default(['pump', 'vacuum']),
  }),
  z.object({ answer: z.literal('deny') }),
])
export const answeredClaimSchema = z.object({ loggerId: idSchema.nullable() })

/** RFC 8628 3.2 */
export const deviceAuthorizationSchema = z.object({
  device_code: z.string(),
  user_code: z.string(),
  verification_uri: z.string(),
  verification_uri_complete: z.string(),
  expires_in: z.number().int(),
  interval: z.number().int(),
})
/** RFC 8628 3.5 */
export const deviceTokenSchema = z.object({ access_token: z.string(), token_type: z.literal('Bearer') })
/** RFC 6749 5.2 */
export const oauthErrorSchema = z.object({ error: z.string(), error_description: z.string().optional() })

export const rejectionReasonSchema = z.enum([
  'future',
  'too-old',
  'impossible',
  'unknown-channel',
  'unknown-unit',
  'bad-value',
  'other-logger',
])
/** POST /api/ingest */
export const ingestAnswerSchema = z.object({
  upload: idSchema,
  samples: z.object({
    received: z.number().int(),
    stored: z.number().int(),
    duplicate: z.number().int(),
    conflicting: z.number().int(),
    rejected: z.number().int(),
  }),
  rejected: z.array(z.object({ index: z.number().int(), reason: rejectionReasonSchema })).max(100),
  rejectedRecords: z.number().int(),
  clock: z.object({ offsetSeconds: z.number().nullable() }),
  serverTime: instantSchema,
  next: z.object({ intervalSeconds: z.number().int(), until: instantSchema.nullable() }),
})
export type IngestAnswer = z.infer<typeof ingestAnswerSchema>
