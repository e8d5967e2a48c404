import { normalDraw, seededRandom, type Random } from '../statistics'
import type { LeakModel } from '../fit'
import type { Instant } from '../fold/types'
import type { Habit } from './habit'
import type { PhaseNow, PhaseScale } from './phase'

export interface Course {
  from: Instant
  stepSeconds: number
  /** Pa/s that the weather adds to the leak in each step. */
  weather: Float64Array
  /** Flushes an hour expected in each step; all nought when nobody flushes. */
  flushesPerHour: Float64Array
  /** Only runs from here until there count. */
  countFrom: Instant
  countTo: Instant
}

export interface Tally {
  /** Share of courses with at least one unprompted run that counts. */
  chance: number
  expectedRuns: number
  /** First run that counts of each course, or the first after `countTo`; ascending, courses without one left out. */
  firstRuns: Instant[]
  /** The same for the very first run of each course. */
  nextRuns: Instant[]
}

/** What barometer and air may do beside yesterday's curve, Pa/h either way (judged from simulated weather). */
const WEATHER_SIGMA_PA_PER_HOUR = 38
/** Switch scatter and small weather from hold to hold (judged). */
const HOLD_SCATTER = 0.025

/**
 * Plays a boat's coming hours many times: the hold time drawn from its uncertainty, flushes by habit, each with
 * one of its own drops, the weather as given. A flush that takes the vacuum under the cut-in starts the pump:
 * that run was prompted and the hold begins anew; one that does not brings the next run nearer.
 */
export function play(
  course: Course,
  start: PhaseNow,
  scale: PhaseScale,
  model: LeakModel,
  habit: Habit,
  { courses, seed, aboardShare }: { courses: number; seed: number; aboardShare: number },
): Tally {
  const random = seededRandom(seed)
  const tally = { hits: 0, runs: 0, firstRuns: [] as Instant[], nextRuns: [] as Instant[] }
  for (let n = 0; n < courses; n += 1) {
    const aboard = (n + 0.5) / courses < aboardShare
    const one = playOnce(course, start, scale, drawHold(model, scale, random), habit, aboard, random)
    if (one.runs > 0) tally.hits += 1
    tally.runs += one.runs
    if (one.first !== null) tally.firstRuns.push(one.first)
    if (one.next !== null) tally.nextRuns.push(one.next)
  }
  const ascending = (a: number, b: number) => a - b
  return {
    chance: tally.hits / courses,
    expectedRuns: tally.runs / courses,
    firstRuns: tally.firstRuns.sort(ascending),
    nextRuns: tally.nextRuns.sort(ascending),
  }
}

/** A hold time out of its uncertainty; behind a bound anything from it upwards, longer ever less likely. */
function drawHold(model: LeakModel, scale: PhaseScale, random: Random): number {
  const normal = normalDraw(random)
  return scale.holdSeconds * Math.exp(model.bound === null ? model.logSigma * normal : 0.6 * Math.abs(normal))
}

function playOnce(
  course: Course,
  start: PhaseNow,
  scale: PhaseScale,
  holdSeconds: number,
  habit: Habit,
  aboard: boolean,
  random: Random,
): { runs: number; first: Instant | null; next: Instant | null } {
  const { stepSeconds, weather, flushesPerHour } = course
  const stretch = holdSeconds / scale.holdSeconds
  const paPerSecond = scale.ratePaPerSecond === null ? null : scale.ratePaPerSecond / stretch
  const drift = (WEATHER_SIGMA_PA_PER_HOUR * normalDraw(random)) / 3600
  let phase = (start.phaseSeconds + start.sigmaSeconds * normalDraw(random)) * stretch
  let hold = holdSeconds * Math.exp(HOLD_SCATTER * normalDraw(random))
  let runs = 0
  let first: Instant | null = null
  let next: Instant | null = null
  for (let k = 0; k < weather.length; k += 1) {
    const at = course.from + k * stepSeconds * 1000
    const pace = paPerSecond === null ? 1 : Math.max(-0.5, 1 + ((weather[k] ?? 0) + drift) / paPerSecond)
    const flushAt = aboard ? drawFlush(flushesPerHour[k] ?? 0, stepSeconds, random) : null
    const until = flushAt ?? stepSeconds
    let elapsed = 0
    // The leak's own runs up to the flush, or to the end of the step.
    while (pace > 0 && phase + (until - elapsed) * pace >= hold) {
      elapsed += Math.max(0, (hold - phase) / pace)
      const runAt = at + elapsed * 1000
      next ??= runAt
      if (runAt >= course.countFrom) first ??= runAt
      if (runAt >= course.countFrom && runAt < course.countTo) runs += 1
      phase = 0
      hold = holdSeconds * Math.exp(HOLD_SCATTER * normalDraw(random))
    }
    phase = Math.max(0, phase + (until - elapsed) * pace)
    if (flushAt === null) continue
    phase = afterFlush(scale, phase, stretch, hold, habit, random)
    phase = Math.max(0, phase + (stepSeconds - flushAt) * pace)
  }
  return { runs, first, next }
}

function drawFlush(perHour: number, stepSeconds: number, random: Random): number | null {
  if (perHour <= 0) return null
  const chance = 1 - Math.exp((-perHour * stepSeconds) / 3600)
  return random() < chance ? random() * stepSeconds : null
}

/** Phase after a flush: nought where it starts the pump, else further down the same hold. */
function afterFlush(
  scale: PhaseScale,
  phase: number,
  stretch: number,
  hold: number,
  { drops }: Habit,
  random: Random,
): number {
  if (drops === null || scale.vacuumAt === null || scale.ofVacuum === null) return 0
  const vacuumPa = scale.vacuumAt(phase / stretch)
  const after =
    scale.ofVacuum(vacuumPa - Math.exp(drops.logMean + drops.logSigma * normalDraw(random))) * stretch
  return after >= hold ? 0 : after
}
