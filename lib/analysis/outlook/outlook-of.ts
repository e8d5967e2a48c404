import { aboardTonight } from './aboard'
import { flushEvents, habitOf, type Habit } from './habit'
import { localHour } from './local-time'
import { phaseNow, phaseScale, type PhaseNow, type PhaseScale } from './phase'
import { play, type Course, type Tally } from './trajectories'
import type { Outlook, OutlookInput, RunExpected } from './types'
import { weatherRates } from './weather'
import type { LeakModel } from '../fit'

const COURSES = 400
/** Steps until the night's end; the next run is sought for two days with coarser ones. */
const STEP_SECONDS = 300
const AHEAD_SECONDS = 48 * 3600
const AHEAD_STEP_SECONDS = 900
/** A span is given where a run is at least this likely. */
const WORTH_SAYING = 0.05

/**
 * What the coming night brings one system. Deterministic: the draws are seeded by the night. Without a model
 * everything is null and the basis is `learning`; with nothing known of the phase the hold is taken to begin now.
 * @example outlookOf({ at, night, offsets, runs, holds, flushes, open, current, model, air: [], said: 'unknown', lastHeardAt, seesFlushes: true })
 */
export function outlookOf(input: OutlookInput): Outlook {
  const { at, night, model } = input
  const events = flushEvents(input)
  const aboard = aboardTonight(input, events)
  const answer = {
    at,
    night: { ...night, hours: (night.to - night.from) / 3_600_000 },
    aboard,
    holdSeconds: model?.observedHoldSeconds ?? null,
    heardAt: input.lastHeardAt,
  }
  if (model === null || !(model.observedHoldSeconds > 0)) return { ...answer, ...LEARNING }
  const scale = phaseScale(model)
  const start = phaseNow(scale, input.open, input.current) ?? {
    at,
    phaseSeconds: 0,
    sigmaSeconds: scale.holdSeconds / 4,
  }
  const habit = habitOf(input, events)
  const asleep = at >= night.from && at < night.to
  const known = asleep || aboard === 'away'
  const context = { input, model, scale, habit }
  const aboardShare = aboard === 'aboard' ? 1 : aboard === 'away' ? 0 : habit.aboardShare
  const asItComes = playNight(context, start, { flushes: true, aboardShare })
  const bedtime = Math.max(night.bedtime, at)
  const flushedLast = playNight(
    context,
    { at: bedtime, phaseSeconds: 0, sigmaSeconds: 0 },
    { flushes: false, aboardShare: 1 },
  )
  const ahead = playAhead(context, start)
  return {
    ...answer,
    chance: asItComes.chance,
    expectedRuns: asItComes.expectedRuns,
    chanceIfFlushedLast: flushedLast.chance,
    expectedRunsIfFlushedLast: flushedLast.expectedRuns,
    firstRun: known
      ? expected(ahead.firstRuns, 0.025)
      : asItComes.chance < WORTH_SAYING
        ? null
        : spanOf(asItComes.firstRuns.filter((run) => run < night.to)),
    nextRun: expected(ahead.nextRuns, 0.025),
    basis: known ? 'phase-known' : 'phase-open',
  }
}

const LEARNING = {
  chance: null,
  chanceIfFlushedLast: null,
  expectedRuns: null,
  expectedRunsIfFlushedLast: null,
  firstRun: null,
  nextRun: null,
  basis: 'learning' as const,
}

interface Context {
  input: OutlookInput
  model: LeakModel
  scale: PhaseScale
  habit: Habit
}

/** From the phase that is known until the night's end, counting what falls in quiet hours still to come. */
function playNight(
  { input, model, scale, habit }: Context,
  start: PhaseNow,
  { flushes, aboardShare }: { flushes: boolean; aboardShare: number },
): Tally {
  const { night, at } = input
  const steps = Math.max(0, Math.ceil((night.to - start.at) / 1000 / STEP_SECONDS))
  const course: Course = {
    from: start.at,
    stepSeconds: STEP_SECONDS,
    weather: weatherRates(input.air, model.gasResponse, start.at, STEP_SECONDS, steps),
    flushesPerHour: new Float64Array(steps),
    countFrom: Math.max(at, night.from, start.at),
    countTo: night.to,
  }
  if (flushes) {
    for (let k = 0; k < steps; k += 1) {
      // Up to now what happened is known, and the phase carries it.
      const stepAt = start.at + k * STEP_SECONDS * 1000
      const hour = localHour(input.offsets, stepAt)
      course.flushesPerHour[k] = stepAt < at ? 0 : (habit.perHour[hour] ?? 0)
    }
  }
  return play(course, start, scale, model, habit, { courses: COURSES, seed: seedOf(night.from), aboardShare })
}

/** With nobody flushing, two days on. */
function playAhead({ input, model, scale, habit }: Context, start: PhaseNow): Tally {
  const steps = AHEAD_SECONDS / AHEAD_STEP_SECONDS
  const course: Course = {
    from: start.at,
    stepSeconds: AHEAD_STEP_SECONDS,
    weather: weatherRates(input.air, model.gasResponse, start.at, AHEAD_STEP_SECONDS, steps),
    flushesPerHour: new Float64Array(steps),
    countFrom: Math.max(input.at, input.night.from),
    countTo: input.night.to,
  }
  return play(course, start, scale, model, habit, {
    courses: 160,
    seed: seedOf(input.night.to),
    aboardShare: 0,
  })
}

const seedOf = (at: number): number => Math.floor(at / 60_000) >>> 0

/** Median with an interval; null where fewer than half of the courses have a run. */
function expected(sorted: readonly number[], tail: number): RunExpected | null {
  const at = sorted[Math.floor(sorted.length / 2)]
  if (at === undefined || sorted.length < 80) return null
  return { at, ...endsOf(sorted, tail) }
}

function spanOf(sorted: readonly number[]): RunExpected | null {
  return sorted.length === 0 ? null : { at: null, ...endsOf(sorted, 0.05) }
}

function endsOf(sorted: readonly number[], tail: number): { earliest: number; latest: number } {
  const pick = (share: number) => sorted[Math.min(sorted.length - 1, Math.floor(share * sorted.length))] ?? 0
  return { earliest: pick(tail), latest: pick(1 - tail) }
}
