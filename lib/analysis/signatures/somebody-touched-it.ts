import { formatDuration } from '@/shared/units'
import { localHour } from '../outlook'
import type { SignatureFinding, SignatureInput } from './types'

const WORKING_HOURS = { from: 8, to: 18 }
const NEAR_MS = 300_000

/**
 * A step in the leak in working hours with no flush and no run near it: somebody touched the system. Offered,
 * never asserted. No steps looked for: none found.
 */
export function somebodyTouchedIt({ steps, runs, flushes, offsets }: SignatureInput): SignatureFinding {
  const signature = 'somebody-touched-it' as const
  const touched = steps.filter(({ between: [from, to], fromPaPerHour, toPaPerHour }) => {
    const middle = (from + to) / 2
    const hour = localHour(offsets, middle)
    const working = hour >= WORKING_HOURS.from && hour < WORKING_HOURS.to
    const near = (at: number) => at >= from - NEAR_MS && at <= to + NEAR_MS
    const alone = !runs.some((run) => near(run.startedAt)) && !flushes.some((flush) => near(flush.at))
    return toPaPerHour > fromPaPerHour && working && alone
  })
  return {
    signature,
    enough: true,
    suspects: touched.map(({ between: [from, to], fromPaPerHour, toPaPerHour }) => ({
      family: 'handled',
      strength: 3,
      basis: `the leak stepped up ${(toPaPerHour / fromPaPerHour).toFixed(1)}-fold within ${formatDuration((to - from) / 1000)} of a working day, with no flush or run near`,
      overturnedBy: 'nobody having been aboard then',
    })),
  }
}
