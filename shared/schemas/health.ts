import { z } from 'zod'
import { instantSchema } from './common'

/** GET /api/health: 200 only when ready. */
export const healthSchema = z.object({
  database: z.enum(['ok', 'unreachable']),
  migrations: z.enum(['current', 'pending', 'unknown']),
  queueLagSeconds: z.number().nullable(),
  lastTickAt: instantSchema.nullable(),
  /** Messages due and not yet accepted. */
  backlog: z.number().int().nullable(),
  /** Version of the time-zone rules the database uses, as far as it tells. */
  zoneData: z.string().nullable(),
})
export type Health = z.infer<typeof healthSchema>
