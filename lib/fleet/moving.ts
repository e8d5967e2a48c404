import type { Step } from '@/lib/analysis/steps'
import { rateTrend, type DailyRate } from '@/lib/analysis/trend'
import type { MovingWord } from '@/shared/schemas'

/** How a system's leak moves, and since when; epoch milliseconds. */
export interface Moving {
  word: MovingWord
  since: number | null
}

const DAY_MS = 86_400_000
/** A step is what moved for so long (its notice stands as long); after that it is the level to be compared with. */
const STEP_DAYS = 14
/** Days of record before anything is said. */
const FEWEST_DAYS = 5
/** Slower than doubling (or halving) in this many days is steady, however certain. */
const SLOWEST_DAYS = 90

/**
 * The word for a system's leak over weeks: a step of the last days; a repair that held and has not been undone by
 * either; a trend; steady. Fewer than five days since the last step or repair and nothing else to say: null.
 * @param known daily rates in order of time, steps in order of time
 * @example movingOf({ days, steps: [], repairedAt: null, at }) // { word: 'worse', since: … }
 */
export function movingOf(known: {
  days: readonly DailyRate[]
  steps: readonly Step[]
  repairedAt: number | null
  at: number
}): Moving | null {
  const { days, steps, repairedAt, at } = known
  const step = steps[steps.length - 1]
  const stepAt = step?.between[1] ?? null
  const up = step !== undefined && step.toPaPerHour > step.fromPaPerHour
  // A repair shows as a step down; only one upwards after it takes the word away.
  const isRepaired = repairedAt !== null && (stepAt === null || !up || stepAt <= repairedAt)
  if (stepAt !== null && at - stepAt < STEP_DAYS * DAY_MS && !(isRepaired && !up))
    return { word: 'stepped', since: stepAt }
  const from = Math.max(stepAt ?? -Infinity, isRepaired ? repairedAt : -Infinity)
  const since = days.filter((day) => day.at - DAY_MS / 2 >= from)
  const trend = rateTrend(since, null)
  const first = since[0]?.at ?? null
  if (trend?.isTrend && trend.doublingDays !== null && Math.abs(trend.doublingDays) < SLOWEST_DAYS) {
    if (trend.doublingDays > 0) return { word: 'worse', since: first }
    if (!isRepaired) return { word: 'better', since: first }
  }
  if (isRepaired) return { word: 'held-since-repair', since: repairedAt }
  return since.length < FEWEST_DAYS ? null : { word: 'steady', since: first }
}
