import {
  DEFAULT_DIFFERENTIAL_PA,
  GAUGE_RESOLUTION_PA,
  judgeLeakDown,
  type LeakDownVerdict,
} from '@/lib/analysis/leak-down'
import { inHgToPa, SECONDS_PER_HOUR } from '@/shared/units'
import { middle } from './readings'
import type { Judged, Reading, SeenRun } from './types'

/** How much of the limit's rate a tee may seem to add before it has to be proven innocent. Judged, no source. */
const TEE_SHARE = 0.5
const SETTLE_MS = 60_000
const END_MS = 60_000
/** A fall of half an inch within half a minute is somebody flushing. */
const FLUSH_PA = inHgToPa(0.5)
const FLUSH_MS = 30_000

export interface RateInterval {
  paPerHour: number
  low: number
  high: number
}
const rateFigure = (name: string, rate: RateInterval): Judged['figures'][number] => ({
  name,
  value: rate.paPerHour,
  unit: 'Pa/h',
  low: rate.low,
  high: rate.high,
})

/** A rate by hand this much finer than what a tee may add is fine enough to be compared with. Judged, no source. */
const BASELINE_SHARE = 0.8

/**
 * The leak-down by hand gauge before anything is cut: what the boat leaks without the tee. It passes once it is fine
 * enough to compare with, however leaky the boat.
 * @param readings.resolutionPa what the gauge can be read to, Pa
 */
export function judgeLeakDownBefore(readings: {
  startPa: number
  endPa: number
  seconds: number
  resolutionPa: number
  differentialPa: number | null
  limitSeconds: number
}): Judged & { rate: RateInterval } {
  const differentialPa = readings.differentialPa ?? DEFAULT_DIFFERENTIAL_PA
  const answer = judgeLeakDown({ ...readings, differentialPa })
  const rate = { paPerHour: answer.paPerHour, low: answer.low, high: answer.high }
  const figures: Judged['figures'] = [
    { name: 'First reading', value: readings.startPa, unit: 'Pa' },
    { name: 'Second reading', value: readings.endPa, unit: 'Pa' },
    { name: 'Between them', value: readings.seconds, unit: 's' },
    rateFigure('Leak rate before', rate),
    { name: 'It would hold', value: answer.holdSeconds, unit: 's' },
  ]
  if (answer.verdict === 'cannot-tell' && answer.moreMinutes === null)
    return {
      outcome: 'cannot-tell',
      figures,
      rate,
      reason:
        'The vacuum rose: that is weather or temperature. Do it again when the engine space is at an even temperature.',
    }
  const wanted = BASELINE_SHARE * allowedPaPerHour(differentialPa, readings.limitSeconds)
  const longer = Math.ceil((((rate.high - rate.low) / 2 / wanted - 1) * readings.seconds) / 60)
  if (longer > 0)
    return {
      outcome: 'cannot-tell',
      figures,
      rate,
      reason: `Too short for what the gauge can be read to: wait ${longer} more ${longer === 1 ? 'minute' : 'minutes'} and read again.`,
    }
  return { outcome: 'passed', figures, rate, reason: BASELINES[answer.verdict] }
}

const BASELINES: Record<LeakDownVerdict, string> = {
  tight: 'The boat is tight before anything is fitted.',
  weeping: 'The boat weeps before anything is fitted. Tell the owner now, not after.',
  leaking: 'The boat leaks before anything is fitted. Tell the owner now, not after.',
  'short-cycling': 'The boat leaks badly before anything is fitted. Tell the owner now, not after.',
  'cannot-tell':
    'Fine enough to compare with; too short to say on which side of a limit the boat is. The logger will.',
}

/** What a tee may seem to add and still pass, Pa/h. */
const allowedPaPerHour = (differentialPa: number, limitSeconds: number): number =>
  (TEE_SHARE * differentialPa * SECONDS_PER_HOUR) / limitSeconds

export interface LeakDownAfterAsked {
  /** Corrected; those since the step began. */
  readings: readonly Reading[]
  runs: readonly SeenRun[]
  beganMs: number
  before: RateInterval | null
  differentialPa: number | null
  limitSeconds: number
}

/**
 * The logger's own leak-down after fitting: does the tee leak? What it added is the difference of the two rates,
 * its half-width the two half-widths together. It passes when even the upper end is small against the limit, fails
 * when the lower end is over nought, and cannot tell in between.
 */
export function judgeLeakDownAfter(asked: LeakDownAfterAsked): Judged & { rate: RateInterval | null } {
  const differentialPa = asked.differentialPa ?? DEFAULT_DIFFERENTIAL_PA
  const from = asked.beganMs + SETTLE_MS
  const measured = asked.readings.filter(({ atMs, vacuumPa }) => atMs >= from && vacuumPa !== null)
  const refuse = (outcome: 'failed' | 'cannot-tell', reason: string) => ({
    outcome,
    figures: [],
    reason,
    rate: null,
  })
  if (asked.runs.length > 0 || measured.some(({ pumpOn }) => pumpOn === true))
    return refuse(
      'failed',
      'The pump ran during the test. Draw down, put its breaker off and tag it, and begin again.',
    )
  if (flushed(measured))
    return refuse('failed', 'Somebody flushed during the test. Tell the crew, draw down, and begin again.')
  const first = measured[0]
  const last = measured.at(-1)
  if (first === undefined || last === undefined || last.atMs - first.atMs < 120_000)
    return refuse(
      'cannot-tell',
      'Not enough readings yet: the first minute settles, then it takes some minutes.',
    )
  const start = around(measured.filter(({ atMs }) => atMs <= first.atMs + END_MS))
  const end = around(measured.filter(({ atMs }) => atMs >= last.atMs - END_MS))
  const [startPa, endPa] = [start.vacuumPa, end.vacuumPa]
  const seconds = (end.atMs - start.atMs) / 1000
  const answer = judgeLeakDown({
    startPa,
    endPa,
    seconds,
    resolutionPa: GAUGE_RESOLUTION_PA.logger,
    differentialPa,
  })
  const rate = { paPerHour: answer.paPerHour, low: answer.low, high: answer.high }
  const figures: Judged['figures'] = [
    { name: 'First reading', value: startPa, unit: 'Pa' },
    { name: 'Last reading', value: endPa, unit: 'Pa' },
    { name: 'Between them', value: seconds, unit: 's' },
    rateFigure('Leak rate after', rate),
    { name: 'It would hold', value: answer.holdSeconds, unit: 's' },
  ]
  const allowed = allowedPaPerHour(differentialPa, asked.limitSeconds)
  if (asked.before === null) return { ...judgedAlone(rate, allowed), figures, rate }
  const added = addedBy(asked.before, rate)
  return {
    ...judgedBeside(added, allowed, seconds),
    figures: [...figures, rateFigure('The tee added', added)],
    rate,
  }
}

/** After less before, with the half-widths of both together. `addedBy(1 ± 1, 2 ± 1) // 1 ± √2` */
export function addedBy(before: RateInterval, after: RateInterval): RateInterval {
  const halfWidth = Math.hypot((before.high - before.low) / 2, (after.high - after.low) / 2)
  const paPerHour = after.paPerHour - before.paPerHour
  return { paPerHour, low: paPerHour - halfWidth, high: paPerHour + halfWidth }
}

function judgedBeside(
  added: RateInterval,
  allowed: number,
  seconds: number,
): Pick<Judged, 'outcome' | 'reason'> {
  if (added.high <= allowed)
    return { outcome: 'passed', reason: 'The tee adds no leak that matters. Not corrected for weather.' }
  if (added.low > 0)
    return {
      outcome: 'failed',
      reason:
        'It leaks more than before the tee went in. Tighten the tee’s clamps, look at its thread and seal, wet them and watch the rate, then begin again.',
    }
  const longer = Math.max(1, Math.ceil(((added.high - added.paPerHour) / allowed - 0.5) * (seconds / 60)))
  return {
    outcome: 'cannot-tell',
    reason: `The two rates cannot be told apart well enough yet. Wait about ${longer} more ${longer === 1 ? 'minute' : 'minutes'}; if the reading by hand was the shorter one, that is what limits it.`,
  }
}

function judgedAlone(rate: RateInterval, allowed: number): Pick<Judged, 'outcome' | 'reason'> {
  if (rate.high <= allowed)
    return {
      outcome: 'passed',
      reason:
        'There is no reading from before, and none is needed: the whole boat with the tee is tight enough.',
    }
  return {
    outcome: 'cannot-tell',
    reason:
      'The boat leaks, and without a reading from before nobody can say whether it is the tee. Wet the tee and its clamps and watch the rate; if it does not fall, the leak is elsewhere: leave this check out and say so.',
  }
}

/** The middle of a few readings, in time and in vacuum. */
const around = (readings: readonly Reading[]) => ({
  atMs: middle(readings.map(({ atMs }) => atMs)),
  vacuumPa: middle(readings.flatMap(({ vacuumPa }) => (vacuumPa === null ? [] : [vacuumPa]))),
})

function flushed(measured: readonly Reading[]): boolean {
  let oldest = 0
  return measured.some((reading, index) => {
    while (reading.atMs - (measured[oldest]?.atMs ?? reading.atMs) > FLUSH_MS) oldest += 1
    const highest = Math.max(...measured.slice(oldest, index + 1).map(({ vacuumPa }) => vacuumPa ?? 0))
    return highest - (reading.vacuumPa ?? 0) >= FLUSH_PA
  })
}
