import { existsSync, mkdirSync, readFileSync, renameSync, writeFileSync } from 'node:fs'
import path from 'node:path'
import { z } from 'zod'
import type { BoatState } from '@/simulator/boat'

/** The boat's own state is this program's to read back; only its time is checked. */
const boatStateSchema = z.custom<BoatState>(
  (value) => typeof value === 'object' && value !== null && 't' in value && typeof value.t === 'number',
)
const savedSchema = z.object({
  version: z.literal(1),
  anchorMs: z.number(),
  timeZone: z.string(),
  offsetSeconds: z.number(),
  vessels: z.record(
    z.string(),
    z.object({
      vesselId: z.string(),
      storyTold: z.boolean(),
      systems: z.array(
        z.object({
          systemId: z.string(),
          loggerId: z.string(),
          key: z.string(),
          postedTo: z.number(),
          state: boatStateSchema.nullable(),
        }),
      ),
    }),
  ),
})
export type Saved = z.infer<typeof savedSchema>
export type SavedVessel = Saved['vessels'][string]

/** What an earlier start left behind, or null. A file that cannot be read counts as none. */
export function loadState(file: string | null): Saved | null {
  if (file === null || !existsSync(file)) return null
  try {
    return savedSchema.parse(JSON.parse(readFileSync(file, 'utf8')))
  } catch {
    return null
  }
}

/** Written beside and renamed, so that a kill leaves the old one or the new one. It holds logger keys: owner only. */
export function saveState(file: string | null, saved: Saved): void {
  if (file === null) return
  mkdirSync(path.dirname(file), { recursive: true })
  const beside = `${file}.${process.pid}.new`
  writeFileSync(beside, JSON.stringify(saved), { mode: 0o600 })
  renameSync(beside, file)
}
