import { z } from 'zod'
import { idSchema, instantSchema, quietHoursSchema } from './common'
import { holdTimeSchema } from './figures'
import { shopAccessSchema } from './people'
import {
  aboardSchema,
  channelSchema,
  movingWordSchema,
  noticeKindSchema,
  partKindSchema,
  stateSchema,
  statementValueSchema,
  systemKindSchema,
} from './words'

const nameSchema = z.string().trim().min(1).max(120)
/** An IANA name; whether the database knows it is asked when it is saved. */
export const timeZoneSchema = z
  .string()
  .min(1)
  .max(64)
  .regex(/^[A-Za-z][A-Za-z0-9_+/-]*$/, 'is not a time zone')

export const partInputSchema = z.object({
  key: z
    .string()
    .regex(/^[A-Za-z0-9][A-Za-z0-9._-]{0,63}$/, 'may hold letters, digits, dot, dash and underscore'),
  kind: partKindSchema,
  name: nameSchema,
  volumeM3: z.number().min(0).max(10).nullable().optional(),
  parent: z.string().max(64).nullable().optional(),
})
export type PartInput = z.infer<typeof partInputSchema>
const partsInputSchema = z
  .array(partInputSchema)
  .max(200)
  .superRefine((parts, context) => {
    const keys = new Set(parts.map((part) => part.key))
    if (keys.size < parts.length) context.addIssue({ code: 'custom', message: 'two parts have the same key' })
    parts.forEach((part, index) => {
      if (part.parent != null && (!keys.has(part.parent) || part.parent === part.key))
        context.addIssue({ code: 'custom', path: [index, 'parent'], message: 'names no other part' })
    })
  })
/** PUT /api/systems/{id}/parts: the whole drawing. */
export const setPartsSchema = z.object({ parts: partsInputSchema })

const paSchema = z.number().positive().max(101_325)
const figuresInput = {
  kind: systemKindSchema.optional(),
  cutOutPa: paSchema.nullable().optional(),
  cutInPa: paSchema.nullable().optional(),
  limitSeconds: z.number().int().positive().max(31_536_000).optional(),
  aimSeconds: z.number().int().positive().max(31_536_000).optional(),
  pumpAmps: z.number().positive().max(1000).nullable().optional(),
}
type Figures = {
  cutOutPa?: number | null | undefined
  cutInPa?: number | null | undefined
  limitSeconds?: number | undefined
  aimSeconds?: number | undefined
}
const figuresAgree = (figures: Figures): boolean =>
  (figures.cutOutPa == null || figures.cutInPa == null || figures.cutOutPa > figures.cutInPa) &&
  (figures.limitSeconds ?? 0) <= (figures.aimSeconds ?? Infinity)
const AGREE = 'the cut-out must be above the cut-in, and the limit not above the aim'

export const systemInputSchema = z
  .object({
    name: z.string().trim().max(120).optional(),
    ...figuresInput,
    parts: partsInputSchema.optional(),
  })
  .refine(figuresAgree, AGREE)
export type SystemInput = z.infer<typeof systemInputSchema>

/** POST /api/vessels */
export const createVesselSchema = z.object({
  name: nameSchema,
  timeZone: timeZoneSchema,
  quietHours: quietHoursSchema.optional(),
  altitudeM: z.number().min(-430).max(5000).optional(),
  harbour: z.string().trim().max(120).optional(),
  berth: z.string().trim().max(120).nullable().optional(),
  shopId: idSchema.optional(),
  ownerEmail: z.email().optional(),
  system: systemInputSchema.optional(),
})
export type CreateVessel = z.infer<typeof createVesselSchema>
export const createdVesselSchema = z.object({ id: idSchema, systems: z.array(z.object({ id: idSchema })) })

/** POST /api/vessels/{id}/systems: a further system on the same boat. */
export const createdSystemSchema = z.object({ id: idSchema })

/** PATCH /api/vessels/{id} */
export const changeVesselSchema = z.object({
  name: nameSchema.optional(),
  timeZone: timeZoneSchema.optional(),
  quietHours: quietHoursSchema.optional(),
  altitudeM: z.number().min(-430).max(5000).optional(),
  harbour: z.string().trim().max(120).nullable().optional(),
  berth: z.string().trim().max(120).nullable().optional(),
})
export type ChangeVessel = z.infer<typeof changeVesselSchema>

/** PUT /api/vessels/{id}/aboard: null takes the word back, and flushes tell again. */
export const setAboardSchema = z.object({
  value: z.boolean().nullable(),
  /** Later than now: for the span from then to `until` alone, which it needs; other times keep what was said of them. */
  from: instantSchema.optional(),
  until: instantSchema.nullable().optional(),
})
/** PUT /api/systems/{id}/statement */
export const setStatementSchema = z.object({
  value: statementValueSchema.nullable(),
  until: instantSchema.nullable().optional(),
})
/** PUT /api/statements: many systems at once, for a lay-up. */
export const setStatementsSchema = setStatementSchema.extend({
  systems: z.array(idSchema).min(1).max(1000),
})

/** GET and PUT /api/systems/{id}/settings; a change is dated and what was not named stays. */
export const settingsSchema = z.object({
  inForceFrom: instantSchema,
  kind: systemKindSchema,
  cutOutPa: z.number().nullable(),
  cutInPa: z.number().nullable(),
  limitSeconds: z.number().int(),
  aimSeconds: z.number().int(),
  silenceSeconds: z.number().int(),
  pumpAmps: z.number().nullable(),
  lowSupplyV: z.number().nullable(),
})
export type Settings = z.infer<typeof settingsSchema>
export const changeSettingsSchema = z
  .object({
    ...figuresInput,
    name: z.string().trim().max(120).optional(),
    silenceSeconds: z.number().int().min(60).max(31_536_000).optional(),
    lowSupplyV: z.number().positive().max(60).nullable().optional(),
    /** Default: now. Earlier corrects the record from then on. */
    inForceFrom: instantSchema.optional(),
  })
  .refine(figuresAgree, AGREE)
export type ChangeSettings = z.infer<typeof changeSettingsSchema>

/** One system in the fleet: GET /api/vessels */
export const fleetRowSchema = z.object({
  vesselId: idSchema,
  systemId: idSchema,
  name: z.string(),
  systemName: z.string(),
  harbour: z.string().nullable(),
  berth: z.string().nullable(),
  timeZone: z.string(),
  utcOffsetSeconds: z.number().int(),
  state: stateSchema,
  since: instantSchema.nullable(),
  holdTime: holdTimeSchema.nullable(),
  limitSeconds: z.number().int(),
  aimSeconds: z.number().int(),
  moving: z.object({ word: movingWordSchema, since: instantSchema.nullable() }).nullable(),
  tonight: z
    .object({
      chance: z.number().nullable(),
      chanceIfFlushedLast: z.number().nullable(),
      expectedRuns: z.number().nullable(),
    })
    .nullable(),
  lastHeardAt: instantSchema.nullable(),
  openNotices: z.array(noticeKindSchema),
  nextVisitAt: instantSchema.nullable(),
  /** Null where the reader may not know who is aboard. */
  aboard: aboardSchema.nullable(),
})
export type FleetRow = z.infer<typeof fleetRowSchema>

export const partSchema = z.object({
  key: z.string(),
  kind: partKindSchema,
  name: z.string(),
  volumeM3: z.number().nullable(),
  parent: z.string().nullable(),
})
export type Part = z.infer<typeof partSchema>

/** The logger now fitted to a system. */
export const fittedLoggerSchema = z.object({
  id: idSchema,
  serial: z.string(),
  intervalSeconds: z.number().int(),
  channels: z.array(channelSchema),
  fittedAt: instantSchema,
  lastHeardAt: instantSchema.nullable(),
  clockOffsetSeconds: z.number().nullable(),
})
export type FittedLogger = z.infer<typeof fittedLoggerSchema>

export const systemSchema = z.object({
  id: idSchema,
  name: z.string(),
  state: stateSchema,
  settings: settingsSchema,
  statement: z
    .object({ value: statementValueSchema, from: instantSchema, until: instantSchema.nullable() })
    .nullable(),
  parts: z.array(partSchema),
  logger: fittedLoggerSchema.nullable(),
})
export type System = z.infer<typeof systemSchema>

/** What the reader may do with this vessel; what is false is not offered. */
export const rightsSchema = z.object({
  fullRecord: z.boolean(),
  changeVessel: z.boolean(),
  changeQuietHours: z.boolean(),
  changeSettings: z.boolean(),
  registerLogger: z.boolean(),
  giveAccess: z.boolean(),
  setAboard: z.boolean(),
  setStatement: z.boolean(),
  askVisit: z.boolean(),
  workVisit: z.boolean(),
  assignVisit: z.boolean(),
  acknowledge: z.boolean(),
})
export type Rights = z.infer<typeof rightsSchema>

/** GET /api/vessels/{id} */
export const vesselSchema = z.object({
  id: idSchema,
  name: z.string(),
  harbour: z.string().nullable(),
  berth: z.string().nullable(),
  timeZone: z.string(),
  /** Now; the browser never asks its own zone data. */
  utcOffsetSeconds: z.number().int(),
  /** The boat's wall clock now, `2026-12-01T23:40`. */
  localTime: z.string(),
  altitudeM: z.number(),
  quietHours: quietHoursSchema,
  owner: z.object({ id: idSchema, name: z.string(), email: z.string() }).nullable(),
  /** The shop that keeps it until an owner accepts. */
  keptBy: z.object({ id: idSchema, name: z.string() }).nullable(),
  access: z.array(shopAccessSchema),
  /** What somebody said of people aboard; null for those without the full record, or nothing said. */
  aboard: z.object({ value: aboardSchema, until: instantSchema.nullable() }).nullable(),
  systems: z.array(systemSchema),
  rights: rightsSchema,
})
export type Vessel = z.infer<typeof vesselSchema>
