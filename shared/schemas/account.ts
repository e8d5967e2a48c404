import { z } from 'zod'
import { idSchema, instantSchema } from './common'
import { emailSchema } from './joining'
import { aboardSchema } from './words'

const password = z.string().min(1, 'is missing').max(1000)
/** Six digits from the device, or a recovery code. */
export const codeSchema = z.string().trim().min(6, 'is six digits').max(40)

/** PUT /api/me/email: takes effect when the link sent to the new address is acted on. */
export const changeEmailSchema = z.object({ email: emailSchema, password })

export const sessionSchema = z.object({
  id: z.uuid(),
  current: z.boolean(),
  createdAt: instantSchema,
  lastSeenAt: instantSchema,
  userAgent: z.string().nullable(),
})
export type Session = z.infer<typeof sessionSchema>

/** GET /api/me/second-factor */
export const secondFactorSchema = z.object({
  on: z.boolean(),
  since: instantSchema.nullable(),
  recoveryCodesLeft: z.number().int(),
})
export type SecondFactor = z.infer<typeof secondFactorSchema>
/** POST /api/me/second-factor: begins; nothing changes until a code from the device is confirmed. */
export const beginSecondFactorSchema = z.object({ password })
export const begunSecondFactorSchema = z.object({
  secret: z.string(),
  uri: z.string(),
  /** The same as a QR code, an SVG as a data address. */
  qr: z.string(),
})
export type BegunSecondFactor = z.infer<typeof begunSecondFactorSchema>
export const confirmSecondFactorSchema = z.object({ code: codeSchema })
/** Shown once; only their hashes are kept. */
export const recoveryCodesSchema = z.object({ recoveryCodes: z.array(z.string()) })
export const endSecondFactorSchema = z.object({ password, code: codeSchema })

/** GET /api/vessels/{id}/aboard: what was said of people aboard from now on. */
export const aboardSpanSchema = z.object({
  id: idSchema,
  value: aboardSchema,
  from: instantSchema,
  until: instantSchema.nullable(),
})
export type AboardSpan = z.infer<typeof aboardSpanSchema>

/** POST /api/account/delete: the address typed again says that it is meant. */
export const deleteAccountSchema = z.object({ email: z.string().max(254), password })
/** GET /api/account/delete: what would go and what would stay. */
export const deletionSchema = z.object({
  /** Vessels whose record goes, since nobody else owns them. */
  vessels: z.array(z.object({ id: idSchema, name: z.string() })),
  /** Vessels that stay with their other owners. */
  shared: z.array(z.object({ id: idSchema, name: z.string() })),
  /** Shops that one is the last manager of while others are in them: these stand in the way. */
  blocked: z.array(z.object({ id: idSchema, name: z.string() })),
  /** Shops that close with it. */
  closing: z.array(z.object({ id: idSchema, name: z.string() })),
  /** Visits that shops keep. */
  visitsKept: z.number().int(),
})
export type Deletion = z.infer<typeof deletionSchema>

/** GET /api/me/export */
export const exportSchema = z.record(z.string(), z.unknown())
