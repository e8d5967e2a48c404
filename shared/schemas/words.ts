import { z } from 'zod'

/** A system's state, in the order in which the first that fits is taken. */
export const stateSchema = z.enum([
  'unheard',
  'laid-up',
  'worked-on',
  'running-on',
  'off',
  'learning',
  'short-cycling',
  'leaking',
  'weeping',
  'tight',
])
export type State = z.infer<typeof stateSchema>

export const triggerSchema = z.enum(['leak', 'flush', 'startup', 'unknown'])
export type Trigger = z.infer<typeof triggerSchema>

export const endingSchema = z.enum(['leak', 'flush', 'unknown', 'interrupted', 'open'])
export type Ending = z.infer<typeof endingSchema>

export const noticeKindSchema = z.enum([
  'night-warning',
  'short-hold',
  'short-cycling',
  'running-on',
  'no-start',
  'slow-recharge',
  'switch-drift',
  'step',
  'logger-silent',
  'sensor-fault',
  'low-supply',
  'freeze',
])
export type NoticeKind = z.infer<typeof noticeKindSchema>

export const aboardSchema = z.enum(['aboard', 'away', 'unknown'])
export type Aboard = z.infer<typeof aboardSchema>

/** Which of leak, pump, switch or gas space shortens the hold time. */
export const causeSchema = z.enum(['leak', 'pump', 'switch', 'gas-space'])
export type Cause = z.infer<typeof causeSchema>

export const movingWordSchema = z.enum(['steady', 'worse', 'better', 'stepped', 'held-since-repair'])
export type MovingWord = z.infer<typeof movingWordSchema>

export const roleSchema = z.enum(['technician', 'installer', 'manager'])
export type Role = z.infer<typeof roleSchema>

/** How much an owner lets a shop see: leak figures, or the full record with flushes and presence. */
export const accessLevelSchema = z.enum(['figures', 'full'])
export type AccessLevel = z.infer<typeof accessLevelSchema>

export const systemKindSchema = z.enum(['pass-through', 'collecting', 'unit', 'two-pumps', 'on-demand'])
export type SystemKind = z.infer<typeof systemKindSchema>

export const partKindSchema = z.enum(['head', 'hose', 'tank', 'switch', 'pump'])
export type PartKind = z.infer<typeof partKindSchema>

export const channelSchema = z.enum(['pump', 'vacuum', 'air', 'barometer', 'supply'])
export type Channel = z.infer<typeof channelSchema>

export const statementValueSchema = z.enum(['off', 'laid-up', 'worked-on'])
export type StatementValue = z.infer<typeof statementValueSchema>

export const visitStatusSchema = z.enum(['asked', 'planned', 'under-way', 'proving', 'closed'])
export type VisitStatus = z.infer<typeof visitStatusSchema>

export const repairVerdictSchema = z.enum(['held', 'better-under-limit', 'no-change', 'worse', 'too-early'])
export type RepairVerdict = z.infer<typeof repairVerdictSchema>

export const leakDownVerdictSchema = z.enum(['tight', 'weeping', 'leaking', 'short-cycling', 'cannot-tell'])
export type LeakDownVerdict = z.infer<typeof leakDownVerdictSchema>

export const messageChannelSchema = z.enum(['email', 'sms'])
export type MessageChannel = z.infer<typeof messageChannelSchema>
