import type { LabelledHold } from './label-holds'

export interface LengthProfile {
  seconds: number
  /** Where twice the log-likelihood has fallen by 3.84. */
  low: number
  high: number
  logSigma: number
  /** Holds that probably ended by the leak near the estimate. */
  near: number
  /** Log-likelihood of the estimate over that of a hold time longer than anything seen. */
  overPlateau: number
}

const LEAST_SECONDS = 120
/** Spread of leak-ended holds about their hold time: weather and the switch's scatter (judged). */
const SPREADS = [0.02, 0.04, 0.07, 0.11, 0.15] as const
/** A fifth of leak-ended holds were shortened by flushes that did not start the pump (judged). */
const SHORTENED = 0.2
const CHI_SQUARED_95 = 3.841458820694124

/**
 * Profile likelihood of the hold time over a grid in its logarithm, the spread profiled out: coarse over all,
 * fine about the best. Each hold is a mixture of leak-ended (lognormal about the hold time, or shortened to
 * anything under it) and flush-cut (a constant hazard at its hour, while the leak had not ended it yet). The
 * survival of the flush hazard is common to both and drops out.
 */
export function profileOf(holds: readonly LabelledHold[]): LengthProfile {
  const logs = holds.map((hold) => Math.log(hold.seconds))
  const longest = Math.max(...holds.map((hold) => hold.seconds), 2 * LEAST_SECONDS)
  const from = Math.log(LEAST_SECONDS)
  const to = Math.log(longest * 2)
  const coarse = gridOf(from, to, 64).map((log) => ({ log, ...bestSpread(holds, logs, log) }))
  const peak = coarse.reduce((best, each) => (each.value > best.value ? each : best))
  const step = (to - from) / 63
  const fine = gridOf(peak.log - 1.2 * step, peak.log + 1.2 * step, 25).map((log) => ({
    log,
    ...bestSpread(holds, logs, log),
  }))
  const all = [...coarse, ...fine].sort((a, b) => a.log - b.log)
  const best = all.reduce((top, each) => (each.value > top.value ? each : top))
  const enough = all.filter((each) => 2 * (best.value - each.value) <= CHI_SQUARED_95)
  const low = Math.exp(Math.min(...enough.map((each) => each.log)))
  const high = Math.exp(Math.max(...enough.map((each) => each.log)))
  const seconds = Math.exp(best.log)
  const plateau = bestSpread(holds, logs, Math.log(longest * 1.7)).value
  const near = holds.reduce((sum, hold, i) => sum + nearness(hold, logs[i] ?? 0, best.log, best.spread), 0)
  return {
    seconds,
    low,
    high,
    logSigma: Math.max(0.004, Math.log(high / low) / 3.92),
    near,
    overPlateau: best.value - plateau,
  }
}

const gridOf = (from: number, to: number, count: number): number[] =>
  Array.from({ length: count }, (_, i) => from + ((to - from) * i) / (count - 1))

function bestSpread(holds: readonly LabelledHold[], logs: readonly number[], logHold: number) {
  let best = { value: -Infinity, spread: 0.05 }
  for (const spread of SPREADS) {
    let value = 0
    for (let i = 0; i < holds.length; i += 1) {
      const hold = holds[i]
      if (hold !== undefined)
        value += Math.log(
          leakPart(hold, logs[i] ?? 0, logHold, spread) +
            flushPart(hold, logs[i] ?? 0, logHold, spread) +
            1e-9,
        )
    }
    if (value > best.value) best = { value, spread }
  }
  return best
}

/** Density per hour of a hold that the leak ended. */
function leakPart(hold: LabelledHold, log: number, logHold: number, spread: number): number {
  const z = (log - logHold) / spread
  const hours = hold.seconds / 3600
  const whole = (Math.exp(-0.5 * z * z) * 0.3989422804014327) / (spread * hours)
  const shortened = z < 0 ? 3600 / Math.exp(logHold) : 0
  return hold.ifLeak * ((1 - SHORTENED) * whole + SHORTENED * shortened)
}

function flushPart(hold: LabelledHold, log: number, logHold: number, spread: number): number {
  return hold.ifFlush * hold.flushesPerHour * upperTail((log - logHold) / spread)
}

function nearness(hold: LabelledHold, log: number, logHold: number, spread: number): number {
  if (Math.abs(log - logHold) > 3 * spread) return 0
  const leak = leakPart(hold, log, logHold, spread)
  return leak / (leak + flushPart(hold, log, logHold, spread) + 1e-12)
}

/**
 * P(Z > z) of a standard normal to 1e-7 (Abramowitz & Stegun 26.2.17): a likelihood needs it a hundred
 * thousand times, and not to more digits.
 */
export function upperTail(z: number): number {
  const x = Math.abs(z)
  if (x > 8) return z > 0 ? 0 : 1
  const t = 1 / (1 + 0.2316419 * x)
  const series =
    t * (0.31938153 + t * (-0.356563782 + t * (1.781477937 + t * (-1.821255978 + t * 1.330274429))))
  const tail = 0.3989422804014327 * Math.exp(-0.5 * x * x) * series
  return z >= 0 ? tail : 1 - tail
}
