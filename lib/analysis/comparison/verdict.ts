import type { RepairVerdict, Signs } from './types'

export type Interval = { value: number; low: number | null; high: number | null }
/** Hold time now; `atLeast` is what half of the holds lasted at least. */
export type Level = { median: number | null; low: number | null; high: number | null; atLeast: number | null }

/** Weather and habit move hold times by this factor without any repair (judged). */
const CHANGED = 1.15
/** Within this factor, and sure of it, nothing has changed (judged). */
const ALIKE = 1.35
/** An interval this narrow against the limit decides by its middle. */
const NEAR_ENOUGH = 1.15

/**
 * The verdict on a repair from the ratio of hold times and the hold time after. Null: too early.
 * A change that the gas space explains is none.
 */
export function judgeRepair(
  ratio: Interval,
  after: Level,
  limitSeconds: number,
  because: 'gas-space' | 'switch' | null,
): Exclude<RepairVerdict, 'too-early'> | null {
  const isBetter = ratio.low !== null && ratio.low > CHANGED
  const isWorse = ratio.high !== null && ratio.high < 1 / CHANGED
  if ((isBetter || isWorse) && because === 'gas-space') return 'no-change'
  if (isWorse) return 'worse'
  if (isBetter) return overLimit(after, limitSeconds)
  const isAlike = ratio.low !== null && ratio.high !== null && ratio.low > 1 / ALIKE && ratio.high < ALIKE
  return isAlike ? 'no-change' : null
}

function overLimit(after: Level, limitSeconds: number): 'held' | 'better-under-limit' | null {
  const low = after.low ?? after.atLeast
  if (low !== null && low >= limitSeconds) return 'held'
  if (after.high !== null && after.high < limitSeconds) return 'better-under-limit'
  const { median } = after
  if (median === null || low === null || after.high === null) return null
  const narrow = after.high / low < NEAR_ENOUGH * NEAR_ENOUGH
  if (!narrow) return null
  return median >= limitSeconds ? 'held' : 'better-under-limit'
}

/** A change of rate and recharge by about this much together is one of the gas space. */
const MOVED = 1.2
const SAME_RATIO = 1.2

/**
 * What besides the leak explains a changed hold time: rate and recharge moved together with K the same, the
 * gas space (a tank that filled or was pumped out); differential moved with the rate the same, the switch.
 */
export function otherCause(before: Signs, after: Signs): 'gas-space' | 'switch' | null {
  const factor = (pick: (signs: Signs) => number | null): number | null => {
    const [a, b] = [pick(after), pick(before)]
    return a === null || b === null || !(a > 0) || !(b > 0) ? null : a / b
  }
  const rate = factor((signs) => signs.ratePaPerSecond)
  const recharge = factor((signs) => signs.rechargePaPerSecond)
  const differential = factor((signs) => signs.differentialPa)
  const ratio = factor((signs) => signs.ratio)
  const same = (value: number | null, within: number) =>
    value !== null && Math.abs(Math.log(value)) < Math.log(within)
  const moved = (value: number | null) => value !== null && !same(value, MOVED)
  const together = rate !== null && recharge !== null && (rate - 1) * (recharge - 1) > 0
  if (moved(rate) && moved(recharge) && together && same(ratio, SAME_RATIO)) return 'gas-space'
  return moved(differential) && same(rate, MOVED) ? 'switch' : null
}

/** Least holds after a visit that say anything. */
const FEWEST = 3
const MOST_HOURS = 168

/**
 * About how many more quiet hours until the verdict: intervals narrow with the square root of the holds.
 * @param holdSeconds how long a hold is expected to last now
 */
export function hoursNeededFor(ratio: Interval | null, holds: number, holdSeconds: number): number {
  const hours = (count: number) => Math.min(MOST_HOURS, Math.max(1, Math.ceil((count * holdSeconds) / 3600)))
  if (ratio === null || ratio.low === null || ratio.high === null || holds < FEWEST)
    return hours(Math.max(1, FEWEST - holds))
  const middle = Math.abs(Math.log(ratio.value))
  const reach = Math.log(ratio.high / ratio.low) / 2
  const decides = Math.max(middle - Math.log(CHANGED), Math.log(ALIKE) - middle)
  const times = Math.max(1.2, (reach / Math.max(decides, 0.05)) ** 2)
  return hours(holds * (times - 1))
}
