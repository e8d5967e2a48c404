import { z } from 'zod'
import { idSchema, instantSchema, pageQuerySchema } from './common'
import { messageChannelSchema, noticeKindSchema } from './words'

/** GET /api/notices?state=open|closed, ascending by opening. */
export const noticeSchema = z.object({
  id: idSchema,
  vesselId: idSchema,
  systemId: idSchema,
  vesselName: z.string(),
  systemName: z.string(),
  timeZone: z.string(),
  kind: noticeKindSchema,
  openedAt: instantSchema,
  closedAt: instantSchema.nullable(),
  /** Held back while the boat is silent, worked on or laid up. */
  heldSince: instantSchema.nullable(),
  acknowledgedAt: instantSchema.nullable(),
  acknowledgedBy: z.string().nullable(),
  acknowledgedNote: z.string().nullable(),
  snoozedUntil: instantSchema.nullable(),
  night: z.string().nullable(),
  reason: z.string(),
  evidence: z.record(z.string(), z.unknown()),
})
export type Notice = z.infer<typeof noticeSchema>

export const noticesQuerySchema = pageQuerySchema.extend({
  state: z.enum(['open', 'closed']).optional(),
  vessel: idSchema.optional(),
  system: idSchema.optional(),
})

/** GET /api/notices/{id}: with what happened to it, and who was told. */
export const noticeWholeSchema = noticeSchema.extend({
  events: z.array(
    z.object({
      at: instantSchema,
      transition: z.enum([
        'opened',
        'worsened',
        'ended',
        'held',
        'resumed',
        'acknowledged',
        'snoozed',
        'escalated',
      ]),
      reason: z.string(),
    }),
  ),
  told: z.array(
    z.object({
      messageId: idSchema,
      name: z.string(),
      channel: messageChannelSchema,
      queuedAt: instantSchema,
      acceptedAt: instantSchema.nullable(),
      deliveredAt: instantSchema.nullable(),
      failedAt: instantSchema.nullable(),
    }),
  ),
})
export type NoticeWhole = z.infer<typeof noticeWholeSchema>

/** POST /api/notices/{id}/acknowledge */
export const acknowledgeSchema = z.object({ note: z.string().trim().max(2000).optional() })
/** PATCH /api/notices/{id}: null wakes it again. */
export const snoozeSchema = z.object({ snoozedUntil: instantSchema.nullable() })

/** GET /api/messages (manager) */
export const messageSchema = z.object({
  id: idSchema,
  /** Null for somebody invited who has no account yet. */
  personId: idSchema.nullable(),
  personName: z.string().nullable(),
  channel: messageChannelSchema,
  to: z.string(),
  subject: z.string().nullable(),
  text: z.string(),
  queuedAt: instantSchema,
  sendAfter: instantSchema,
  acceptedAt: instantSchema.nullable(),
  deliveredAt: instantSchema.nullable(),
  failedAt: instantSchema.nullable(),
  failure: z.string().nullable(),
  noticeIds: z.array(idSchema),
})
export type Message = z.infer<typeof messageSchema>
export const messagesQuerySchema = pageQuerySchema.extend({
  state: z.enum(['waiting', 'sent', 'failed']).optional(),
})

/** GET /api/outbox (demo and test) */
export const outboxSchema = z.object({
  items: z.array(
    z.object({
      id: idSchema,
      at: instantSchema,
      channel: messageChannelSchema,
      to: z.string(),
      subject: z.string().nullable(),
      text: z.string(),
      html: z.string().nullable(),
      noticeId: idSchema.nullable(),
    }),
  ),
})
export type Outbox = z.infer<typeof outboxSchema>
