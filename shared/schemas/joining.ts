import { z } from 'zod'
import { idSchema, instantSchema, quietHoursSchema } from './common'
import { shopSchema } from './people'
import { accessLevelSchema, noticeKindSchema, roleSchema, visitStatusSchema } from './words'

const nameSchema = z.string().trim().min(1, 'is missing').max(120)
export const emailSchema = z.email('must look like name@boat.example').max(254)
/** What a new password must be; what it must not be is nobody's business. */
export const newPasswordSchema = z.string().min(10, 'needs at least 10 characters').max(200)
const zoneSchema = z.string().trim().min(1, 'is missing').max(64)
/** 256 random bits as they stand in a link. */
const secretSchema = z.string().min(20).max(200)

/** POST /api/sign-up: an owner, or a shop with its first manager. The answer is the same for every address. */
export const signUpSchema = z.object({
  email: emailSchema,
  name: nameSchema,
  shop: z
    .object({ name: nameSchema, harbour: z.string().trim().max(120).optional(), timeZone: zoneSchema })
    .optional(),
})
export type SignUp = z.infer<typeof signUpSchema>

/** What a link in a mail would confirm. */
export const confirmationSchema = z.object({
  kind: z.enum(['sign-up', 'change-email', 'contact']),
  email: z.string(),
  shopName: z.string().nullable(),
})
export type Confirmation = z.infer<typeof confirmationSchema>

/** POST /api/confirm-email: a new account chooses its password here. */
export const confirmEmailSchema = z.object({ token: secretSchema, password: newPasswordSchema.optional() })
export const confirmedSchema = confirmationSchema.pick({ kind: true, email: true })

export const forgotPasswordSchema = z.object({ email: emailSchema })
export const resetPasswordSchema = z.object({ token: secretSchema, password: newPasswordSchema })

/** POST /api/invitations: into a shop with a role, or as the owner of a vessel. */
export const inviteSchema = z
  .object({
    email: emailSchema,
    shopId: idSchema.optional(),
    role: roleSchema.optional(),
    vesselId: idSchema.optional(),
  })
  .refine(
    (invite) =>
      (invite.vesselId !== undefined) !== (invite.shopId !== undefined && invite.role !== undefined),
    'name a shop with a role, or a vessel',
  )
export type Invite = z.infer<typeof inviteSchema>

/** GET /api/invitations: those that wait, of a shop or of a vessel. */
export const invitationsQuerySchema = z
  .object({ shop: idSchema.optional(), vessel: idSchema.optional() })
  .refine((query) => (query.shop === undefined) !== (query.vessel === undefined), 'name a shop or a vessel')
export const invitationSchema = z.object({
  id: idSchema,
  email: z.string(),
  shopId: idSchema.nullable(),
  role: roleSchema.nullable(),
  vesselId: idSchema.nullable(),
  vesselName: z.string().nullable(),
  invitedBy: z.string().nullable(),
  createdAt: instantSchema,
  expiresAt: instantSchema,
  acceptedAt: instantSchema.nullable(),
  withdrawnAt: instantSchema.nullable(),
})
export type Invitation = z.infer<typeof invitationSchema>

/** POST /api/invitations/look: what the link in the mail invites to. The secret stays out of addresses and logs. */
export const lookAtInvitationSchema = z.object({ token: secretSchema })
export const invitationToSchema = z.object({
  email: z.string(),
  shopName: z.string().nullable(),
  role: roleSchema.nullable(),
  vesselName: z.string().nullable(),
  /** The shop that keeps the vessel until an owner accepts. */
  keptBy: z.string().nullable(),
  invitedBy: z.string().nullable(),
  expiresAt: instantSchema,
  hasAccount: z.boolean(),
})
export type InvitationTo = z.infer<typeof invitationToSchema>

/** POST /api/invitations/accept: name and password are asked of people without an account. */
export const acceptInvitationSchema = z.object({
  token: secretSchema,
  name: nameSchema.optional(),
  password: newPasswordSchema.optional(),
  /** What the shop that kept the vessel may see from now on; leak figures when not said. */
  keepShop: z.enum(['none', ...accessLevelSchema.options]).optional(),
})
export type AcceptInvitation = z.infer<typeof acceptInvitationSchema>
export const acceptedSchema = z.object({
  vesselId: idSchema.nullable(),
  shopId: idSchema.nullable(),
  newAccount: z.boolean(),
  email: z.string(),
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

/** GET /api/shops/{id} */
export const shopWholeSchema = shopSchema.extend({
  /** Kinds of notices the shop is told of; null = the usual ones. */
  toldKinds: z.array(noticeKindSchema).nullable(),
  quietHours: quietHoursSchema,
  /** Who is told of urgent notices that nobody took up; null = the managers, and who agreed to night calls. */
  onCall: z.object({ personId: idSchema, name: z.string() }).nullable(),
})
export type ShopWhole = z.infer<typeof shopWholeSchema>

/** PATCH /api/shops/{id} */
export const changeShopSchema = z.object({
  name: nameSchema.optional(),
  harbour: z.string().trim().max(120).nullable().optional(),
  timeZone: zoneSchema.optional(),
  toldKinds: z.array(noticeKindSchema).nullable().optional(),
  quietHours: quietHoursSchema.optional(),
  onCallId: idSchema.nullable().optional(),
})
export type ChangeShop = z.infer<typeof changeShopSchema>
/** POST /api/me/shops: a shop of one's own; who opens it is its first manager. */
export const openShopSchema = z.object({
  name: nameSchema,
  harbour: z.string().trim().max(120).optional(),
  timeZone: zoneSchema,
})

/** GET /api/vessels/{id}/access: who can see this boat, for its owner. */
export const vesselAccessSchema = z.object({
  owners: z.array(z.object({ personId: idSchema, name: z.string(), since: instantSchema })),
  shops: z.array(
    z.object({
      shopId: idSchema,
      shopName: z.string(),
      level: accessLevelSchema,
      since: instantSchema,
      people: z.array(z.object({ name: z.string(), roles: z.array(roleSchema) })),
      /** Visits that open the full record while they last. */
      openVisits: z.array(
        z.object({ id: idSchema, status: visitStatusSchema, startedAt: instantSchema.nullable() }),
      ),
    }),
  ),
  ended: z.array(
    z.object({
      shopName: z.string(),
      level: accessLevelSchema,
      from: instantSchema,
      until: instantSchema,
    }),
  ),
})
export type VesselAccess = z.infer<typeof vesselAccessSchema>

/** GET /api/vessels/{id}/log and /api/shops/{id}/log: who saw and changed what matters, newest first. */
export const logEntrySchema = z.object({
  id: idSchema,
  at: instantSchema,
  who: z.string(),
  /** In words, as in "gave Saltern Quay the leak figures". */
  did: z.string(),
  vesselId: idSchema.nullable(),
  vesselName: z.string().nullable(),
})
export type LogEntry = z.infer<typeof logEntrySchema>
