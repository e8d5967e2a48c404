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

/** GET /api/shops/{id}/people */
export const shopPersonSchema = z.object({
  personId: idSchema,
  name: z.string(),
  email: z.string(),
  roles: z.array(roleSchema),
  since: instantSchema,
})
export type ShopPerson = z.infer<typeof shopPersonSchema>

/** PUT /api/shops/{id}/people/{personId}: no roles = out of the shop. */
export const setRolesSchema = z.object({ roles: z.array(roleSchema).max(3) })

export const changeShopSchema = z.object({
  name: z.string().trim().min(1).max(120).optional(),
  harbour: z.string().trim().max(120).nullable().optional(),
  timeZone: z.string().max(64).optional(),
})

/** POST /api/invitations: into a shop with a role, or as the owner of a vessel. */
export const inviteSchema = z
  .object({
    email: z.email(),
    shopId: idSchema.optional(),
    role: roleSchema.optional(),
    vesselId: idSchema.optional(),
  })
  .refine(
    (invite) =>
      (invite.vesselId !== undefined) !== (invite.shopId !== undefined && invite.role !== undefined),
    'name a shop with a role, or a vessel',
  )
export const invitationSchema = z.object({
  id: idSchema,
  email: z.string(),
  shopId: idSchema.nullable(),
  role: roleSchema.nullable(),
  vesselId: idSchema.nullable(),
  createdAt: instantSchema,
  expiresAt: instantSchema,
  acceptedAt: instantSchema.nullable(),
  withdrawnAt: instantSchema.nullable(),
})
export type Invitation = z.infer<typeof invitationSchema>

/** POST /api/invitations/accept: name and password are asked of people without an account. */
export const acceptInvitationSchema = z.object({
  token: z.string().min(20).max(200),
  name: z.string().trim().min(1).max(120).optional(),
  password: z.string().min(10).max(200).optional(),
})
/** GET /api/invitations/{token}: what one is invited to. */
export const invitationToSchema = z.object({
  email: z.string(),
  shopName: z.string().nullable(),
  role: roleSchema.nullable(),
  vesselName: z.string().nullable(),
  expiresAt: instantSchema,
  hasAccount: z.boolean(),
})

export const forgotPasswordSchema = z.object({ email: z.email() })
export const resetPasswordSchema = z.object({
  token: z.string().min(20).max(200),
  password: z.string().min(10).max(200),
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
