import { z } from 'zod'
import { idSchema, instantSchema } from './common'
import { accessLevelSchema, messageChannelSchema, noticeKindSchema, roleSchema } from './words'

export const unitChoiceSchema = z.object({
  vacuum: z.enum(['inHg', 'kPa', 'mbar']),
  temperature: z.enum(['C', 'F']),
  volume: z.enum(['L', 'usGal', 'impGal']),
  clock: z.enum(['24h', '12h']).default('24h'),
})
export type Units = z.infer<typeof unitChoiceSchema>

export const shopSchema = z.object({
  id: idSchema,
  name: z.string(),
  harbour: z.string().nullable(),
  timeZone: z.string(),
})
export type Shop = z.infer<typeof shopSchema>

/** GET /api/me */
export const meSchema = z.object({
  person: z.object({ id: idSchema, name: z.string(), email: z.string() }),
  /** `owner` when at least one vessel is one's own. */
  roles: z.array(z.enum(['owner', ...roleSchema.options])),
  shops: z.array(shopSchema.extend({ roles: z.array(roleSchema) })),
  /** Own vessels, by name: an owner's Tonight page begins here. */
  ownVessels: z.array(z.object({ id: idSchema, name: z.string() })),
  units: unitChoiceSchema,
})
export type Me = z.infer<typeof meSchema>

/** PATCH /api/me */
export const changeMeSchema = z.object({
  name: z.string().trim().min(1).max(120).optional(),
  units: unitChoiceSchema.partial().optional(),
})

/** PUT /api/me/password */
export const changePasswordSchema = z.object({
  current: z.string().max(1000),
  next: z.string().min(10, 'needs at least 10 characters').max(200),
})

/** What somebody wants to be told by one address, and how. */
export const contactSettingsSchema = z.object({
  /** Kinds told by this address; absent = the usual ones of the kind of person. */
  kinds: z.array(noticeKindSchema).optional(),
  /** Urgent notices also in the receiver's quiet hours. */
  urgentAtNight: z.boolean().optional(),
  /** Chance of a run from which on a night warning is sent. */
  nightWarningChance: z.number().min(0.05).max(0.99).optional(),
})
export type ContactSettings = z.infer<typeof contactSettingsSchema>

export const contactSchema = z.object({
  id: idSchema,
  channel: messageChannelSchema,
  address: z.string(),
  verifiedAt: instantSchema.nullable(),
  consentedAt: instantSchema.nullable(),
  stoppedAt: instantSchema.nullable(),
  settings: contactSettingsSchema,
})
export type Contact = z.infer<typeof contactSchema>

/** POST /api/me/contacts: a telephone number is verified by a code sent to it. */
export const addContactSchema = z.discriminatedUnion('channel', [
  z.object({ channel: z.literal('email'), address: z.email() }),
  z.object({
    channel: z.literal('sms'),
    address: z.string().regex(/^\+[1-9]\d{6,14}$/, 'must start with + and the country code'),
  }),
])
export const verifyContactSchema = z.object({ code: z.string().regex(/^\d{6}$/, 'is six digits') })
export const changeContactSchema = z.object({
  settings: contactSettingsSchema.optional(),
  stopped: z.boolean().optional(),
})

/** PUT /api/vessels/{id}/access/{shopId} */
export const setAccessSchema = z.object({ level: accessLevelSchema })
export const shopAccessSchema = z.object({
  shopId: idSchema,
  shopName: z.string(),
  level: accessLevelSchema,
  grantedAt: instantSchema,
})
export type ShopAccess = z.infer<typeof shopAccessSchema>
