import { PA_PER_INHG } from '@/shared/units'
import { median } from '../statistics'
import type { SignatureFinding, SignatureInput, Suspect } from './types'

const RECENT_MS = 7 * 86_400_000
const BELOW_PA = 0.7 * PA_PER_INHG
const LEAST_SECONDS = 300
const NEAR_ZERO_PA = 2 * PA_PER_INHG

/**
 * Long runs that plateau below the cut-out. Near zero right after a flush, and cured by the next: a bowl valve
 * that hung open. Else by how fast the vacuum falls afterwards: fast is a big leak, slow a weak pump. No long run:
 * nothing; no vacuum: not enough.
 */
export function plateau({ runs, holds, flushes, figures, at }: SignatureInput): SignatureFinding {
  const signature = 'plateau' as const
  const { cutOutPa } = figures
  if (cutOutPa === null) return { signature, enough: false, missing: 'a vacuum channel' }
  const low = runs.filter(
    (run) =>
      run.stoppedAt > at - RECENT_MS &&
      run.stoppedAt - run.startedAt >= LEAST_SECONDS * 1000 &&
      run.vacuumAtStopPa !== null &&
      run.vacuumAtStopPa < cutOutPa - BELOW_PA,
  )
  if (low.length === 0) return { signature, enough: true, suspects: [] }
  const hung = low.filter(
    (run) =>
      (run.vacuumAtStopPa ?? Infinity) < NEAR_ZERO_PA &&
      flushes.some((flush) => Math.abs(flush.at - run.startedAt) < 120_000),
  )
  const suspects: Suspect[] = []
  if (hung.length > 0) {
    suspects.push({
      family: 'bowl-valve',
      strength: 6,
      basis: `near zero after a flush with the pump on, ${hung.length} times`,
      overturnedBy: 'the same without a flush before',
    })
  }
  const falls = holds
    .filter((hold) => low.some((run) => run.stoppedAt === hold.startedAt))
    .flatMap((hold) => {
      const hours = (hold.endedAt - hold.startedAt) / 3_600_000
      return hold.cutOutPa === null || hold.endPa === null || hours <= 0
        ? []
        : [(hold.cutOutPa - hold.endPa) / hours]
    })
  const fall = median(falls)
  const usual = (figures.signs.usual.ratePaPerSecond ?? figures.signs.now.ratePaPerSecond ?? 0) * 3600
  if (hung.length === 0 && fall !== null && usual > 0) {
    const fast = fall > 3 * usual
    suspects.push({
      family: fast ? 'fixed-fitting' : 'pump',
      strength: fast ? 2.5 : 4,
      basis: `stays under the cut-out, and afterwards falls ${fast ? 'fast: a big leak' : 'slowly: a weak pump'}`,
      overturnedBy: fast ? 'a slow fall with the pump off' : 'a full vacuum with the tank plugged off',
    })
  }
  return { signature, enough: true, suspects }
}
