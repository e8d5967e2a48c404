import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  CLEAN,
  defaultBoat,
  flowForBoatHold,
  joinTruths,
  randomBoat,
  simulateBoat,
  type BoatOverrides,
  type BoatSpec,
  type BoatState,
} from '@/simulator/boat'
import { driftingClock, loggerClock, sendableAt } from '@/simulator/logger'
import { PA_PER_INHG } from '@/simulator/physics/constants'
import { saturationPressurePa } from '@/simulator/physics/gas'
import { times } from '@/tests/support/long'

const FROM = Date.UTC(2026, 4, 3)
const HOUR = 3_600_000
const DAY = 24 * HOUR

const clean = (overrides: BoatOverrides = {}): BoatSpec =>
  defaultBoat({
    ...CLEAN,
    ...overrides,
    habits: { ...CLEAN.habits, ...overrides.habits },
    logger: { ...CLEAN.logger, ...overrides.logger },
    gas: { ...CLEAN.gas, ...overrides.gas },
  })
const leakFor = (spec: BoatSpec, kind: 'orifice' | 'laminar', hours: number, part = 'tank') => ({
  part,
  kind,
  flowPaM3PerS: flowForBoatHold(spec, kind, hours * 3600),
})
const hours = (hold: { startedAt: number; endedAt: number }): number => (hold.endedAt - hold.startedAt) / HOUR
const mean = (values: readonly number[]): number =>
  values.reduce((sum, each) => sum + each, 0) / values.length

describe('hold times', () => {
  it('are those of the leak law to 1 in 10,000 when nothing else disturbs, by either law, 5 min to 20 h', () => {
    for (const kind of ['orifice', 'laminar'] as const) {
      for (const holdHours of [1 / 12, 1.4, 20]) {
        const spec = clean({ leaks: [leakFor(clean(), kind, holdHours)] })
        const { truth } = simulateBoat(spec, FROM, FROM + 5 * DAY)
        const seen = truth.holds.slice(1).filter((hold) => hold.ending === 'leak')
        expect(seen.length).toBeGreaterThan(3)
        for (const hold of seen) expect(Math.abs(hours(hold) / holdHours - 1)).toBeLessThan(1e-4)
        expect(truth.holdTimeSeconds(FROM + DAY) / 3600).toBeCloseTo(holdHours, 6)
      }
    }
  })

  it('are within 1 % of the truth on 20 drawn boats in steady surroundings, from the switch points as they were', () => {
    for (let seed = 1; seed <= 20; seed++) {
      const spec = randomBoat(seed, { steady: true, flushesPerDay: 0, holdSeconds: 300 * 1.25 ** seed })
      const { truth } = simulateBoat(spec, FROM, FROM + 4 * DAY)
      const seen = truth.holds.slice(1).filter((hold) => hold.flushes === 0)
      expect(seen.length).toBeGreaterThan(2)
      const points = truth.switchPoints(FROM)
      for (const hold of seen) {
        // The switch scatters; scale to its nominal differential.
        const share = (hold.vacuumAtStartPa - hold.vacuumAtEndPa) / (points.cutOutPa - points.cutInPa)
        const nominal = (hours(hold) * 3600) / share
        expect(Math.abs(nominal / truth.holdTimeSeconds(FROM) - 1)).toBeLessThan(0.01)
      }
    }
  })

  it('in weather, with settling, are on average those from the settled top', () => {
    const base = defaultBoat({ habits: { aboard: 'never' } })
    const spec = defaultBoat({ habits: { aboard: 'never' }, leaks: [leakFor(base, 'laminar', 2)] })
    const { truth } = simulateBoat(spec, FROM, FROM + 10 * DAY)
    const seen = truth.holds.filter((hold) => hold.ending === 'leak' && hold.settledPa !== null)
    const settled = mean(seen.map((hold) => hold.vacuumAtStartPa - (hold.settledPa ?? 0)))
    expect(settled).toBeGreaterThan(0.1 * PA_PER_INHG)
    expect(settled).toBeLessThan(0.35 * PA_PER_INHG)
    const leaked = truth.leakPaPerHour(FROM, 10 * PA_PER_INHG) * (3 / 60)
    const expected = truth.holdTimeFromSettledSeconds(FROM, settled - leaked)
    expect(Math.abs(mean(seen.map(hours)) / (expected / 3600) - 1)).toBeLessThan(0.03)
  })
})

describe('the gas keeps its books', () => {
  it('a sealed boat keeps its air through weather: p/T is steady once the vapour is taken off', () => {
    const spec = defaultBoat({
      gas: { lagSeconds: 0, coupling: 1, wetness: 1, heatShare: 0 },
      habits: { aboard: 'never' },
      logger: {
        noise: { vacuumPa: 0, airC: 0, barometerPa: 0, supplyV: 0 },
        resolution: { vacuumPa: 0, airC: 0, barometerPa: 0, supplyV: 0 },
      },
    })
    const { samples } = simulateBoat(spec, FROM, FROM + 3 * DAY)
    const amounts = samples.map(({ barometerPa, vacuumPa, airC }) => {
      const [outside, vacuum, air] = [barometerPa ?? 0, vacuumPa ?? 0, airC ?? 0]
      return (outside - vacuum - saturationPressurePa(air)) / (air + 273.15)
    })
    // Readings are rounded to 0.1 Pa and 0.01 °C.
    for (const amount of amounts) expect(Math.abs(amount / (amounts[0] ?? 0) - 1)).toBeLessThan(5e-5)
    const vacuums = samples.map((sample) => sample.vacuumPa ?? 0)
    expect(Math.max(...vacuums) - Math.min(...vacuums)).toBeGreaterThan(500)
  })

  it('a falling barometer alone takes as much vacuum (sealed volume at one temperature, ideal gas)', () => {
    const spec = clean({ weather: { meanC: 20, dailyC: 0, wanderC: 0, synopticPa: 800 } })
    const { samples } = simulateBoat(spec, FROM, FROM + 2 * DAY)
    for (const sample of samples) {
      expect((sample.barometerPa ?? 0) - (sample.vacuumPa ?? 0)).toBeCloseTo(
        (samples[0]?.barometerPa ?? 0) - (samples[0]?.vacuumPa ?? 0),
        -0.2,
      )
    }
  })

  it('what leaks in is what the vacuum-decay equation finds, V·(p2/T2 − p1/T1)/t (40 CFR 1065.644)', () => {
    const flow = 2e-3
    const spec = clean({
      initialVacuumPa: 9.01 * PA_PER_INHG,
      leaks: [{ part: 'tank', kind: 'laminar', flowPaM3PerS: flow }],
    })
    const { samples } = simulateBoat(spec, FROM, FROM + HOUR / 6)
    const [first, last] = [samples[0], samples[samples.length - 1]]
    const seconds = ((last?.at ?? 0) - (first?.at ?? 0)) / 1000
    const found = (0.04 * ((first?.vacuumPa ?? 0) - (last?.vacuumPa ?? 0))) / seconds
    expect(Math.abs(found / flow - 1)).toBeLessThan(0.01)
  })

  it('a leak past choking loses vacuum at one rate, whatever the depth', () => {
    const spec = clean({
      initialVacuumPa: 20 * PA_PER_INHG,
      switch: { cutOutPa: 24 * PA_PER_INHG, cutInPa: 15 * PA_PER_INHG },
      leaks: [{ part: 'tank', kind: 'orifice', flowPaM3PerS: 4e-3 }],
    })
    const { samples } = simulateBoat(spec, FROM, FROM + 10 * HOUR)
    const at = (index: number) => samples[index]?.vacuumPa ?? 0
    expect((at(0) - at(200)) / (at(1000) - at(1200))).toBeCloseTo(1, 3)
  })
})

describe('restarting', () => {
  const through = (spec: BoatSpec, cuts: readonly number[], to: number) => {
    let state: BoatState | undefined
    let from = FROM
    const parts = [...cuts, to].map((until) => {
      const part = simulateBoat(spec, from, until, state ? { resume: state } : {})
      state = JSON.parse(JSON.stringify(part.end)) as BoatState
      const start = from
      from = until
      return { ...part, start }
    })
    const [first, ...rest] = parts
    if (!first) throw new Error('no parts')
    return {
      samples: parts.flatMap((part) => part.samples),
      truth: rest.reduce((sum, part) => joinTruths(sum, part.truth, part.start), first.truth),
      end: state,
    }
  }

  it('gives the same samples, truth and end however a stretch is cut', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 1e6 }),
        fc.array(fc.integer({ min: 1, max: 8 * HOUR - 1 }), { maxLength: 6 }),
        fc.boolean(),
        (seed, cuts, collects) => {
          const spec: BoatSpec = {
            ...randomBoat(seed, { changing: true, holdSeconds: 300 + (seed % 7) * 1500, flushesPerDay: 60 }),
            tank: { collects, filledAtStartM3: 0.001, pumpOuts: [{ at: FROM + 3 * HOUR, minutes: 7 }] },
            breakerOff: [{ from: FROM + 5 * HOUR, to: FROM + 5.4 * HOUR }],
          }
          const whole = simulateBoat(spec, FROM, FROM + 8 * HOUR)
          const sorted = [...cuts].sort((a, b) => a - b).map((cut) => FROM + cut)
          const cut = through(spec, sorted, FROM + 8 * HOUR)
          expect(cut.samples).toEqual(whole.samples)
          expect(cut.truth.runs).toEqual(whole.truth.runs)
          expect(cut.truth.holds).toEqual(whole.truth.holds)
          expect(cut.truth.flushes).toEqual(whole.truth.flushes)
          expect(cut.truth.openRun).toEqual(whole.truth.openRun)
          expect(cut.truth.openHold).toEqual(whole.truth.openHold)
          for (let at = FROM; at < FROM + 8 * HOUR; at += 0.37 * HOUR) {
            expect(cut.truth.holdTimeSeconds(at)).toBe(whole.truth.holdTimeSeconds(at))
          }
          expect({ ...cut.end, baseline: null }).toEqual({
            ...(JSON.parse(JSON.stringify(whole.end)) as BoatState),
            baseline: null,
          })
        },
      ),
      { numRuns: times(30) },
    )
  })

  it('does not change what it resumes from, nor the boat', () => {
    const spec = randomBoat(5)
    const before = JSON.stringify(spec)
    const { end } = simulateBoat(spec, FROM, FROM + HOUR)
    const state = JSON.stringify(end)
    simulateBoat(spec, FROM + HOUR, FROM + 2 * HOUR, { resume: end })
    expect(JSON.stringify(end)).toBe(state)
    expect(JSON.stringify(spec)).toBe(before)
    expect(() => simulateBoat(spec, FROM, FROM - 1)).toThrow(RangeError)
  })
})

describe('runs and flushes', () => {
  it('flushes follow the habit by hour, drop the vacuum by inches, and stop when nobody is aboard', () => {
    const away = { from: FROM + 20 * DAY, to: FROM + 30 * DAY }
    const spec = defaultBoat({ offsetSeconds: -5 * 3600, habits: { away: [away], tapsPerDay: 0 } })
    const { truth } = simulateBoat(spec, FROM, FROM + 30 * DAY)
    const perDay = spec.habits.flushesByHour.reduce((sum, each) => sum + each, 0)
    expect(truth.flushes.length / 20).toBeGreaterThan(perDay * 0.85)
    expect(truth.flushes.length / 20).toBeLessThan(perDay * 1.15)
    expect(truth.flushes.filter((flush) => flush.at >= away.from)).toEqual([])
    const localHour = (at: number) => new Date(at - 5 * HOUR).getUTCHours()
    const night = truth.flushes.filter((flush) => localHour(flush.at) < 5).length
    const morning = truth.flushes.filter(
      (flush) => localHour(flush.at) >= 6 && localHour(flush.at) < 9,
    ).length
    expect(morning).toBeGreaterThan(5 * night)
    for (const flush of truth.flushes) {
      expect(flush.dropPa).toBeGreaterThan(0.8 * PA_PER_INHG)
      expect(flush.dropPa).toBeLessThan(8 * PA_PER_INHG)
    }
    // No leak: every run is some flush's.
    expect(truth.runs.every((run) => run.trigger === 'flush')).toBe(true)
    expect(truth.runs.length).toBe(truth.flushes.filter((flush) => flush.startedPump).length)
  })

  it('a small flush into a big tank does not start the pump', () => {
    const spec = clean({
      volumeM3: 0.3,
      initialVacuumPa: 9.8 * PA_PER_INHG,
      habits: {
        aboard: 'always',
        flushesByHour: Array.from({ length: 24 }, () => 0),
        extraFlushes: [{ at: FROM + HOUR, head: 'head-1' }],
      },
    })
    const { truth } = simulateBoat(spec, FROM, FROM + 2 * HOUR)
    expect(truth.runs).toEqual([])
    expect(truth.flushes).toMatchObject([{ head: 'head-1', startedPump: false }])
    expect(truth.flushes[0]?.dropPa).toBeLessThan(0.7 * PA_PER_INHG)
  })

  it('a big leak holds the pump below its cut-out, and it runs on', () => {
    const base = clean()
    const spec = clean({
      leaks: [{ part: 'hose-1', kind: 'orifice', flowPaM3PerS: 7, onsetAt: FROM + HOUR }],
    })
    const { truth, samples } = simulateBoat(spec, FROM, FROM + 6 * HOUR)
    expect(truth.openRun).toMatchObject({ trigger: 'leak' })
    const late = samples.slice(-100).map((sample) => sample.vacuumPa ?? 0)
    expect(Math.max(...late)).toBeLessThan(base.switch.cutOutPa - PA_PER_INHG)
    expect(Math.max(...late) - Math.min(...late)).toBeLessThan(5)
  })

  it('off at the breaker the vacuum goes; switched on again it is a start-up', () => {
    const spec = clean({
      leaks: [leakFor(clean(), 'laminar', 0.5)],
      breakerOff: [{ from: FROM + 2 * HOUR, to: FROM + 5 * HOUR }],
    })
    const { truth } = simulateBoat(spec, FROM, FROM + 8 * HOUR)
    const started = truth.runs.filter((run) => run.startedAt >= FROM + 2 * HOUR)
    expect(started[0]).toMatchObject({ startedAt: FROM + 5 * HOUR, trigger: 'startup' })
    expect(
      truth.runs.filter((run) => run.stoppedAt > FROM + 2 * HOUR && run.startedAt < FROM + 5 * HOUR),
    ).toEqual([])
    expect(truth.holds.filter((hold) => hold.ending === 'off')).toHaveLength(1)
    expect(started.slice(1).every((run) => run.trigger === 'leak')).toBe(true)
  })

  it('a pump that does not start leaves the vacuum to go, whatever is flushed', () => {
    const fails = { from: FROM + HOUR, to: FROM + 4 * HOUR }
    const spec = clean({
      pumpFails: [fails],
      habits: {
        aboard: 'always',
        flushesByHour: Array.from({ length: 24 }, () => 0),
        extraFlushes: [2, 2.5, 3].map((hour) => ({ at: FROM + hour * HOUR, head: 'head-1' })),
      },
    })
    const { truth, samples } = simulateBoat(spec, FROM, FROM + 5 * HOUR)
    expect(truth.runs).toMatchObject([{ startedAt: fails.to, trigger: 'startup' }])
    expect(truth.flushes.map((flush) => flush.startedPump)).toEqual([false, false, false])
    const before = samples.filter((sample) => sample.at < fails.to).at(-1)
    expect(before?.vacuumPa).toBeLessThan(4 * PA_PER_INHG)
  })

  it('a check valve seats anew at each run, a bowl valve at each flush of its head alone', () => {
    const flowsOf = (part: string, seat: { reseatsAtRun?: number; reseatsAtFlush?: number }) => {
      const spec = clean({
        leaks: [{ ...leakFor(clean(), 'laminar', 1, part), ...seat }, leakFor(clean(), 'laminar', 1, 'tank')],
        habits: {
          aboard: 'always',
          flushesByHour: Array.from({ length: 24 }, () => 0),
          extraFlushes: [{ at: FROM + 10.1 * HOUR, head: 'head-1' }],
        },
      })
      const { truth } = simulateBoat(spec, FROM, FROM + 20 * HOUR)
      return truth.holds.map((hold) => truth.leakFlowByPart(hold.startedAt + 1).get(part) ?? 0)
    }
    const differing = (flows: readonly number[]): number =>
      new Set(flows.map((flow) => flow.toPrecision(9))).size
    const check = flowsOf('pump', { reseatsAtRun: 0.4 })
    expect(differing(check)).toBe(check.length)
    expect(differing(flowsOf('head-1', { reseatsAtFlush: 0.4 }))).toBe(2)
    expect(differing(flowsOf('head-2', { reseatsAtFlush: 0.4 }))).toBe(1)
  })

  it('a seal wetted by a cup of water holds until it is dry', () => {
    const leak = {
      ...leakFor(clean(), 'laminar', 0.5, 'head-1'),
      wetting: { wetShare: 1 / 30, wetSeconds: 4 * 3600, dryingSeconds: 600 },
    }
    const spec = clean({
      leaks: [leak],
      habits: {
        aboard: 'always',
        flushesByHour: Array.from({ length: 24 }, () => 0),
        cups: [{ at: FROM + 6 * HOUR, head: 'head-1' }],
      },
    })
    const { truth } = simulateBoat(spec, FROM, FROM + 20 * HOUR)
    expect(truth.holdTimeSeconds(FROM + 5 * HOUR)).toBeCloseTo(1800, 3)
    expect(truth.holdTimeSeconds(FROM + 7 * HOUR)).toBeCloseTo(30 * 1800, 2)
    // Dry it lasts half an hour; wet a thirtieth of the leak passes until the cup has drained.
    expect(Math.max(...truth.holds.map(hours))).toBeGreaterThan(1.5)
    expect(truth.holdTimeSeconds(FROM + 19 * HOUR)).toBeCloseTo(1800, 0)
  })

  it('a filling tank shortens the hold with the leak unchanged; pumped out, it is as before', () => {
    const spec = clean({
      volumeM3: 0.06,
      tank: { collects: true, filledAtStartM3: 0.03, pumpOuts: [{ at: FROM + DAY, minutes: 10 }] },
      leaks: [leakFor({ ...clean(), volumeM3: 0.06 }, 'orifice', 4)],
    })
    const { truth } = simulateBoat(spec, FROM, FROM + 3 * DAY)
    expect(truth.holdTimeSeconds(FROM + HOUR) / 3600).toBeCloseTo(2, 6)
    expect(truth.holdTimeSeconds(FROM + 2 * DAY) / 3600).toBeCloseTo(4, 6)
    expect(truth.leakFlowByPart(FROM).get('tank')).toBeCloseTo(
      truth.leakFlowByPart(FROM + 2 * DAY).get('tank') ?? 0,
      12,
    )
    const after = truth.holds.filter((hold) => hold.startedAt > FROM + DAY + HOUR / 2)
    expect(mean(after.map(hours))).toBeCloseTo(4, 2)
  })

  it('a worn pump takes longer for the same band', () => {
    const spec = clean({
      leaks: [leakFor(clean(), 'laminar', 1)],
      pump: { wear: [{ from: FROM, perDay: 0.03 }] },
    })
    const { truth } = simulateBoat(spec, FROM, FROM + 12 * DAY)
    const seconds = truth.runs.map((run) => (run.stoppedAt - run.startedAt) / 1000)
    expect((seconds.at(-1) ?? 0) / (seconds[1] ?? 1)).toBeGreaterThan(1.5)
  })
})

describe('the logger', () => {
  const spec = clean({ leaks: [leakFor(clean(), 'laminar', 1)] })

  it('samples in its rhythm and at each pump edge, strictly forward in time', () => {
    const { samples, truth } = simulateBoat(spec, FROM, FROM + DAY)
    const edges = samples.filter((sample, index) => index > 0 && sample.pumpOn !== samples[index - 1]?.pumpOn)
    const starts = truth.runs.flatMap((run) => [Math.round(run.startedAt), Math.round(run.stoppedAt)])
    expect(edges.map((sample) => sample.at)).toEqual(starts)
    samples.forEach((sample, index) => expect(sample.at).toBeGreaterThan(samples[index - 1]?.at ?? 0))
    const periodic = new Set(
      samples.filter((sample) => !starts.includes(sample.at)).map((sample) => sample.at % 15_000),
    )
    expect(periodic.size).toBe(1)
    expect(samples.length).toBe(5760 + edges.length)
  })

  it('carries its channels only, without edges when it has no pump channel', () => {
    const only = (channels: BoatSpec['logger']['channels']) =>
      simulateBoat(clean({ leaks: spec.leaks, logger: { channels } }), FROM, FROM + DAY).samples
    expect(only(['vacuum'])).toHaveLength(5760)
    expect(only(['vacuum'])[0]).toMatchObject({ pumpOn: null, airC: null, barometerPa: null, supplyV: null })
    expect(only(['pump']).length).toBeGreaterThan(5760)
    expect(only(['pump'])[0]).toMatchObject({ vacuumPa: null, pumpOn: false })
  })

  it('reads in steps of its resolution', () => {
    const { samples } = simulateBoat(
      defaultBoat({
        logger: { resolution: { vacuumPa: 338.6389, airC: 0.5, barometerPa: 100, supplyV: 0.1 } },
      }),
      FROM,
      FROM + HOUR,
    )
    for (const sample of samples) {
      const steps = (sample.vacuumPa ?? 0) / 338.6389
      expect(Math.abs(steps - Math.round(steps))).toBeLessThan(1e-3)
      expect(((sample.airC ?? 0) * 2) % 1).toBe(0)
    }
  })

  it('says what its clock says: a drift of 10 s a day is 100 s after 10 days', () => {
    const drifting = clean({ logger: { clock: driftingClock(10, FROM) } })
    const clock = loggerClock(drifting.logger)
    expect(clock.says(FROM + 10 * DAY) - (FROM + 10 * DAY)).toBeCloseTo(100_000, 3)
    expect(clock.trueAt(clock.says(FROM + 3.3 * DAY))).toBeCloseTo(FROM + 3.3 * DAY, 1)
    const { samples } = simulateBoat(drifting, FROM, FROM + 2 * DAY)
    expect((samples.at(-1)?.at ?? 0) - (FROM + 2 * DAY)).toBeGreaterThan(3_000)
  })

  it('records nothing while silent, and keeps what is late until its span is over', () => {
    const silent = { from: FROM + 2 * HOUR, to: FROM + 5 * HOUR }
    const quiet = clean({
      logger: { silent: [silent], late: [{ from: FROM + 6 * HOUR, to: FROM + 9 * HOUR }] },
    })
    const { samples } = simulateBoat(quiet, FROM, FROM + 8 * HOUR)
    expect(samples.filter((sample) => sample.at >= silent.from && sample.at < silent.to)).toEqual([])
    expect(samples.length).toBe(5 * 240)
    expect(sendableAt(quiet.logger, FROM + 7 * HOUR)).toBe(FROM + 9 * HOUR)
    expect(sendableAt(quiet.logger, FROM + HOUR)).toBe(FROM + HOUR)
  })
})

it('draws the same boat from the same seed, and plausible ones from a thousand', () => {
  expect(randomBoat(42)).toEqual(randomBoat(42))
  for (let seed = 1; seed <= 1000; seed++) {
    const spec = randomBoat(seed)
    const { truth } = simulateBoat(spec, FROM, FROM)
    const holdHours = truth.holdTimeSeconds(FROM) / 3600
    expect(holdHours).toBeGreaterThan(0.08)
    expect(holdHours).toBeLessThan(41)
    expect(spec.volumeM3).toBeGreaterThanOrEqual(0.01)
    expect(spec.volumeM3).toBeLessThanOrEqual(0.08)
  }
})
