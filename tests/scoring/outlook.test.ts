import { expect, test } from 'vitest'
import { figuresOf } from '@/lib/analysis/figures'
import { outlookOf, type AirPoint, type Outlook } from '@/lib/analysis/outlook'
import { quantile } from '@/lib/analysis/statistics'
import { simulateBoat, type BoatSpec, type SimSample } from '@/simulator/boat'
import { randomBoat, type RandomBoatKind } from '@/simulator/random-boat'
import { inputAt, recordOf } from './recorded-boat'

const HOUR_MS = 3_600_000
const DAY_MS = 24 * HOUR_MS
const FROM = Date.UTC(2027, 5, 7, 12)

/** Hold times even in their logarithm between half an hour and 30 h. */
const holdSecondsOf = (index: number, count: number): number => 1800 * 60 ** ((index + 0.5) / count)

interface Asked {
  seed: number
  outlook: Outlook
  ran: boolean
  runs: number
  /** True start of the next run after the question, whatever the hour. */
  nextRunAt: number | null
}

/** Asks at 20:00 of each of the given days about the night from 22:00 to 07:00 (the place's clock is UTC). */
function askNights(spec: BoatSpec, days: readonly number[], said: 'unknown' | 'away'): Asked[] {
  const last = Math.max(...days)
  const { samples, truth } = simulateBoat(spec, FROM, FROM + (last + 3) * DAY_MS)
  const { boat, take } = recordOf(spec, FROM)
  let taken = 0
  return days.map((day) => {
    const at = FROM + day * DAY_MS + 8 * HOUR_MS
    const until = samples.findIndex((sample) => sample.at >= at)
    take(samples.slice(taken, until))
    taken = until
    const night = { from: at + 2 * HOUR_MS, to: at + 11 * HOUR_MS, bedtime: at + 2.5 * HOUR_MS }
    const input = inputAt(spec, boat, at)
    const { runs, holds, flushes } = boat.rows
    const outlook = outlookOf({
      at,
      night,
      offsets: [{ from: 0, seconds: 0 }],
      runs,
      holds,
      flushes,
      open: input.open,
      current: input.current,
      model: figuresOf(input).model,
      air: airOf(samples.slice(0, until), at),
      said,
      lastHeardAt: at,
      seesFlushes: spec.logger.channels.includes('vacuum'),
    })
    const unprompted = truth.runs.filter(
      (run) => run.trigger === 'leak' && run.startedAt >= night.from && run.startedAt < night.to,
    )
    const next = truth.runs.find((run) => run.startedAt > at)
    return {
      seed: spec.seed,
      outlook,
      ran: unprompted.length > 0,
      runs: unprompted.length,
      nextRunAt: next?.startedAt ?? null,
    }
  })
}

/** A point each half hour of the last two days. */
function airOf(samples: readonly SimSample[], at: number): AirPoint[] {
  let next = at - 2 * DAY_MS
  return samples.flatMap((sample) => {
    if (sample.at < next || sample.airC === null) return []
    next = sample.at + HOUR_MS / 2
    return [{ at: sample.at, airC: sample.airC, barometerPa: sample.barometerPa }]
  })
}

function brierOf(name: string, asked: readonly Asked[]) {
  const told = asked.flatMap((one) =>
    one.outlook.chance === null ? [] : [{ ...one, chance: one.outlook.chance }],
  )
  const mean = (values: readonly number[]) => values.reduce((sum, value) => sum + value, 0) / values.length
  const brier = mean(told.map(({ chance, ran }) => (chance - (ran ? 1 : 0)) ** 2))
  const base = mean(told.map(({ ran }) => (ran ? 1 : 0)))
  const expected = told.reduce((sum, one) => sum + (one.outlook.expectedRuns ?? 0), 0)
  const seen = told.reduce((sum, one) => sum + one.runs, 0)
  console.log(
    `${name}: ${told.length} of ${asked.length} nights, Brier ${brier.toFixed(4)}, base rate ${base.toFixed(2)} (its Brier ${(base * (1 - base)).toFixed(4)}), ` +
      `runs expected ${expected.toFixed(0)}, seen ${seen}`,
  )
  return { silent: asked.length - told.length, brier, baseBrier: base * (1 - base), expected, seen }
}

const drawn = (count: number, seed: number, kind: Partial<RandomBoatKind>): BoatSpec[] =>
  Array.from({ length: count }, (_, index) =>
    randomBoat(seed + index, { intervalSeconds: 60, holdSeconds: holdSecondsOf(index, count), ...kind }),
  )

test('as it comes: 40 boats, four nights each', () => {
  const asked = drawn(40, 510_000, {}).flatMap((spec) => askNights(spec, [7, 8, 9, 10], 'unknown'))
  const found = brierOf('as it comes', asked)
  expect(found.silent).toBe(0)
  expect(found.brier).toBeLessThanOrEqual(0.075)
  expect(found.brier).toBeLessThanOrEqual(0.8 * found.baseBrier)
  expect(Math.abs(found.expected / found.seen - 1)).toBeLessThanOrEqual(0.1)
})

test('as it comes, pump only: 30 boats, two nights each', () => {
  const asked = drawn(30, 520_000, { logger: 'pump-only' }).flatMap((spec) =>
    askNights(spec, [8, 9], 'unknown'),
  )
  const found = brierOf('as it comes, pump only', asked)
  expect(found.silent).toBe(0)
  expect(found.brier).toBeLessThanOrEqual(0.8 * found.baseBrier)
})

test('next run with nobody flushing: 80 boats', () => {
  const asked = drawn(80, 530_000, {}).flatMap((spec) => {
    const at = FROM + 6 * DAY_MS + 8 * HOUR_MS
    const away = [{ from: at - HOUR_MS, to: at + 3 * DAY_MS }]
    return askNights({ ...spec, habits: { ...spec.habits, away } }, [6], 'away')
  })
  const errors = asked.flatMap(({ outlook, nextRunAt }) => {
    const foretold = outlook.nextRun?.at ?? null
    if (foretold === null || nextRunAt === null) return []
    return [{ error: Math.abs(foretold - nextRunAt) / (nextRunAt - outlook.at), outlook, nextRunAt }]
  })
  const covered = errors.filter(
    ({ outlook, nextRunAt }) =>
      (outlook.nextRun?.earliest ?? Infinity) <= nextRunAt && nextRunAt <= (outlook.nextRun?.latest ?? 0),
  )
  const sizes = errors.map(({ error }) => error)
  const p = (share: number) => quantile(sizes, share) ?? NaN
  console.log(
    `next run: ${errors.length} of ${asked.length}, error of the time left: median ${(100 * p(0.5)).toFixed(1)} %, ` +
      `95th ${(100 * p(0.95)).toFixed(1)} %, worst ${(100 * p(1)).toFixed(1)} %, covered ${((100 * covered.length) / errors.length).toFixed(0)} %`,
  )
  expect(errors.length).toBeGreaterThanOrEqual(78)
  expect(p(0.5)).toBeLessThanOrEqual(0.05)
  expect(p(0.95)).toBeLessThanOrEqual(0.2)
  expect(covered.length / errors.length).toBeGreaterThanOrEqual(0.88)
})
