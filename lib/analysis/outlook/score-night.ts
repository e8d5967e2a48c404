import { labelHolds } from '../hold-time'
import type { NightInput, NightScore } from './types'

/** A gap of this much of the night leaves it unknown whether the pump ran. */
const GAP_SECONDS = 1800

/**
 * What a past night brought, beside what had been foretold: `hit`, `false`, `missed` or `quiet`; `unknown` where
 * the night was not heard whole and no run tells anyway. A run of unknown trigger counts when its lengths say
 * that the leak started it.
 */
export function scoreNight(input: NightInput): NightScore {
  const { night, runs, holds, foretold, heardUntil } = input
  const ofLeak = new Set(
    labelHolds(input, night.from - 7 * 86_400_000, 400)
      .filter((hold) => hold.ifLeak > hold.ifFlush)
      .map((hold) => hold.endedAt),
  )
  const own = runs
    .filter((run) => run.startedAt >= night.from && run.startedAt < night.to)
    .filter((run) => run.trigger === 'leak' || (run.trigger === 'unknown' && ofLeak.has(run.startedAt)))
    .map((run) => run.startedAt)
    .sort((a, b) => a - b)
  const gaps = holds
    .filter((hold) => hold.ending === 'interrupted' && hold.endedAt > night.from && hold.endedAt < night.to)
    .reduce((sum, hold) => sum + gapAfter(input, hold.endedAt), 0)
  const heard = heardUntil >= night.to && gaps < GAP_SECONDS
  if (own.length === 0 && !heard) return { outcome: 'unknown', runs: null, firstRunAt: null }
  const ran = own.length > 0
  const outcome = ran ? (foretold ? 'hit' : 'missed') : foretold ? 'false' : 'quiet'
  return { outcome, runs: own.length, firstRunAt: own[0] ?? null }
}

/** From an interruption to the next thing seen, s. */
function gapAfter({ runs, holds, night }: NightInput, endedAt: number): number {
  const next = [...runs, ...holds].map((row) => row.startedAt).filter((at) => at > endedAt)
  return (Math.min(night.to, ...next) - endedAt) / 1000
}
