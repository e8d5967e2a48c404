import { describe, expect, it } from 'vitest'
import { judgeBreakerOff } from '@/lib/commissioning/checks/breaker-off'
import { judgeFirstReading } from '@/lib/commissioning/checks/first-reading'
import { addedBy, judgeLeakDownAfter, judgeLeakDownBefore } from '@/lib/commissioning/checks/leak-down'
import { judgePumpChannel } from '@/lib/commissioning/checks/pump-channel'
import { judgeTwoPoint } from '@/lib/commissioning/checks/two-point'
import type { Reading, SeenRun } from '@/lib/commissioning/checks/types'
import { judgeZero, ZERO_LIMIT_PA } from '@/lib/commissioning/checks/zero'
import { inHgToPa } from '@/shared/units'

/** A reading every so many seconds from 0 on. */
const every = (seconds: number, values: readonly number[], pumpOn: boolean | null = false): Reading[] =>
  values.map((vacuumPa, index) => ({ atMs: index * seconds * 1000, vacuumPa, pumpOn }))
const figure = (judged: { figures: { name: string; value: number | null }[] }, name: string) =>
  judged.figures.find((entry) => entry.name === name)?.value

describe('first reading', () => {
  const well = { channels: ['pump', 'vacuum'] as const, seen: ['vacuum', 'pump'] as const, samples: 4 }
  it('passes with every channel and a clock that is right, or not known', () => {
    expect(judgeFirstReading({ ...well, clockOffsetSeconds: 3 }).outcome).toBe('passed')
    expect(judgeFirstReading({ ...well, clockOffsetSeconds: null }).outcome).toBe('passed')
  })
  it('cannot tell before anything has come', () => {
    expect(judgeFirstReading({ ...well, seen: [], samples: 0, clockOffsetSeconds: null }).outcome).toBe(
      'cannot-tell',
    )
  })
  it('names the channel that is missing and what to try', () => {
    const judged = judgeFirstReading({ ...well, seen: ['vacuum'], clockOffsetSeconds: 0 })
    expect(judged.outcome).toBe('failed')
    expect(judged.reason).toMatch(/without the pump: check the lead/)
  })
  it('fails a clock over two minutes off, either way', () => {
    expect(judgeFirstReading({ ...well, clockOffsetSeconds: -121 }).outcome).toBe('failed')
    expect(judgeFirstReading({ ...well, clockOffsetSeconds: 120 }).outcome).toBe('passed')
  })
})

describe('zero check', () => {
  it('passes a small steady offset and tells it', () => {
    const judged = judgeZero(every(2, [900, 40, 38, 42, 40]), 0)
    expect(judged.outcome).toBe('passed')
    // The first may have been taken while the port was being opened.
    expect(figure(judged, 'Reads when open')).toBe(40)
  })
  it('waits for three readings, and counts none from before it began', () => {
    expect(judgeZero(every(2, [40, 40, 40]), 0).outcome).toBe('cannot-tell')
    expect(judgeZero(every(2, [40, 40, 40, 40, 40]), 4_000).outcome).toBe('cannot-tell')
    expect(judgeZero([], 0).outcome).toBe('cannot-tell')
  })
  it('fails one that does not stand still, and one far from nought', () => {
    expect(judgeZero(every(2, [0, 0, 300, 0, 290]), 0).reason).toMatch(/stand still/)
    const far = ZERO_LIMIT_PA + 1
    expect(judgeZero(every(2, [far, far, far, far]), 0).outcome).toBe('failed')
    expect(judgeZero(every(2, [-far, -far, -far, -far]), 0).reason).toMatch(/open air/)
  })
})

describe('two-point check', () => {
  const at = (pa: number, pumpOn = false) => every(2, [pa, pa, pa, pa], pumpOn)
  const asked = {
    nowMs: 8_000,
    freshSeconds: 90,
    zeroPa: 60,
    gaugePa: inHgToPa(10),
    resolutionPa: inHgToPa(0.125),
  }
  it('leaves the gain at 1 within what the gauge can be read to', () => {
    const judged = judgeTwoPoint({ ...asked, readings: at(inHgToPa(10.1) + 60) })
    expect(judged.outcome).toBe('passed')
    expect(judged.correction).toEqual({ vacuumOffsetPa: 60, vacuumGain: 1 })
  })
  it('sets the gain so that the corrected reading is the gauge’s', () => {
    const readPa = inHgToPa(9.7) + 60
    const { correction, outcome } = judgeTwoPoint({ ...asked, readings: at(readPa) })
    expect(outcome).toBe('passed')
    const { vacuumOffsetPa, vacuumGain } = correction ?? { vacuumOffsetPa: NaN, vacuumGain: NaN }
    expect((readPa - vacuumOffsetPa) * vacuumGain).toBeCloseTo(inHgToPa(10), 6)
    expect(vacuumGain).toBeCloseTo(10 / 9.7, 9)
  })
  it('fails a sensor over a twentieth off, and one that sees no vacuum', () => {
    expect(judgeTwoPoint({ ...asked, readings: at(inHgToPa(9.4)) })).toMatchObject({
      outcome: 'failed',
      correction: null,
    })
    expect(judgeTwoPoint({ ...asked, readings: at(100) }).reason).toMatch(/cock/)
    expect(judgeTwoPoint({ ...asked, readings: at(60) }).outcome).toBe('failed')
  })
  it('waits for the nought, a fresh reading, stillness, and enough vacuum', () => {
    const well = at(inHgToPa(10))
    for (const wrong of [
      { zeroPa: null },
      { nowMs: 200_000 },
      { readings: at(inHgToPa(10), true) },
      { readings: every(2, [inHgToPa(10), inHgToPa(9.8)]) },
      { gaugePa: inHgToPa(4) },
    ])
      expect(judgeTwoPoint({ ...asked, readings: well, ...wrong }).outcome).toBe('cannot-tell')
  })
})

describe('pump channel', () => {
  const run = (over: Partial<SeenRun> = {}): SeenRun => ({
    startedAtMs: 1_000,
    stoppedAtMs: 31_000,
    trigger: 'flush',
    vacuumAtStartPa: 26_000,
    vacuumAtStopPa: 33_800,
    ...over,
  })
  const vacuum = { hasVacuum: true }
  it('passes a whole run with the vacuum rising, or without a vacuum channel', () => {
    const judged = judgePumpChannel([run()], [], vacuum)
    expect(judged.outcome).toBe('passed')
    expect(figure(judged, 'The run took')).toBe(30)
    const blind = run({ vacuumAtStartPa: null, vacuumAtStopPa: null })
    expect(judgePumpChannel([blind], [], { hasVacuum: false }).outcome).toBe('passed')
    expect(judgePumpChannel([blind], [], vacuum).outcome).toBe('failed')
  })
  it('waits for a start, and for the stop', () => {
    expect(judgePumpChannel([], [], vacuum).outcome).toBe('cannot-tell')
    expect(judgePumpChannel([run({ stoppedAtMs: null })], [], vacuum).outcome).toBe('cannot-tell')
  })
  it('knows an inverted signal by a falling vacuum, and by never being off', () => {
    const inverted = run({ vacuumAtStartPa: 33_800, vacuumAtStopPa: 27_000 })
    expect(judgePumpChannel([inverted], [], vacuum).reason).toMatch(/inverted/)
    expect(judgePumpChannel([], every(2, [30_000, 30_000, 30_000], true), vacuum).outcome).toBe('failed')
  })
})

describe('breaker off', () => {
  const cutInPa = inHgToPa(8)
  const flat = (inHg: number, count: number) => Array.from({ length: count }, () => inHgToPa(inHg))
  const asked = { runs: [], beganMs: 0, intervalSeconds: 60, cutInPa }
  it('passes a minute under the cut-in without a start', () => {
    const readings = every(2, [...flat(9.5, 20), ...flat(6, 40)])
    expect(judgeBreakerOff({ ...asked, readings, nowMs: 120_000 }).outcome).toBe('passed')
  })
  it('waits for the vacuum to fall, and then for the minute', () => {
    expect(judgeBreakerOff({ ...asked, readings: every(2, flat(9.5, 60)), nowMs: 120_000 }).outcome).toBe(
      'cannot-tell',
    )
    const short = every(2, [...flat(9.5, 20), ...flat(6, 10)])
    expect(judgeBreakerOff({ ...asked, readings: short, nowMs: 60_000 }).reason).toMatch(/minute longer/)
  })
  it('fails when the pump starts', () => {
    const readings = every(2, [...flat(9.5, 20), ...flat(6, 40)])
    const run = {
      startedAtMs: 50_000,
      stoppedAtMs: null,
      trigger: 'flush' as const,
      vacuumAtStartPa: 1,
      vacuumAtStopPa: null,
    }
    expect(judgeBreakerOff({ ...asked, readings, runs: [run], nowMs: 120_000 }).reason).toMatch(
      /pump started/,
    )
  })
  it('fails when the readings stop with the breaker', () => {
    const readings = every(2, flat(9.5, 5))
    expect(judgeBreakerOff({ ...asked, readings, nowMs: 400_000 }).reason).toMatch(/readings stopped/)
    expect(judgeBreakerOff({ ...asked, readings: [], nowMs: 400_000 }).outcome).toBe('failed')
  })
  it('watches the pump alone where there is no vacuum', () => {
    const blind = every(10, flat(0, 13)).map((reading) => ({ ...reading, vacuumPa: null }))
    const judged = judgeBreakerOff({ ...asked, cutInPa: null, readings: blind, nowMs: 125_000 })
    expect(judged.outcome).toBe('passed')
  })
})

describe('leak-down', () => {
  /** 1.8 inHg between stop and start, so that the 30-minute rule and the 3 h rule are one. */
  const differentialPa = inHgToPa(1.8)
  const before = (lossInHg: number, minutes = 30) =>
    judgeLeakDownBefore({
      startPa: inHgToPa(10),
      endPa: inHgToPa(10 - lossInHg),
      seconds: minutes * 60,
      resolutionPa: inHgToPa(0.1),
      differentialPa,
      limitSeconds: 10_800,
    })
  it('takes any boat as it is, once the gauge can tell', () => {
    expect(before(0.9).outcome).toBe('passed')
    expect(before(0.9).reason).toMatch(/leaks before/)
    expect(before(0.9).rate.paPerHour).toBeCloseTo(inHgToPa(1.8), 6)
    expect(before(0.1).outcome).toBe('passed')
    // 95 % of a difference of two readings lie within 0.776 steps: 0.155 inHg/h after 30 min, where 0.24 are wanted.
    expect(before(0.1, 19).reason).toMatch(/wait 1 more minute /)
    expect(before(0.1, 20).outcome).toBe('passed')
    expect(before(-0.5).reason).toMatch(/weather/)
  })

  /** A straight loss of so many inHg an hour, read every 10 s. */
  const falling = (inHgPerHour: number, minutes: number) =>
    every(
      10,
      Array.from({ length: minutes * 6 + 1 }, (_, index) => inHgToPa(10 - (inHgPerHour * index) / 360)),
    )
  const after = (inHgPerHour: number, over: Partial<Parameters<typeof judgeLeakDownAfter>[0]> = {}) =>
    judgeLeakDownAfter({
      readings: falling(inHgPerHour, 30),
      runs: [],
      beganMs: 0,
      before: before(0.1).rate,
      differentialPa,
      limitSeconds: 10_800,
      ...over,
    })
  it('measures the rate that was there', () => {
    expect(after(0.2).rate?.paPerHour).toBeCloseTo(inHgToPa(0.2), 3)
  })
  it('adds the half-widths of both readings', () => {
    expect(addedBy({ paPerHour: 1, low: -2, high: 4 }, { paPerHour: 2, low: -2, high: 6 })).toEqual({
      paPerHour: 1,
      low: -4,
      high: 6,
    })
  })
  it('passes a tee that adds nothing, on a tight boat and on a leaking one', () => {
    expect(after(0.2).outcome).toBe('passed')
    expect(after(1.8, { before: before(0.9).rate }).outcome).toBe('passed')
  })
  it('fails a tee that leaks', () => {
    expect(after(1.5).outcome).toBe('failed')
    expect(after(1.5).reason).toMatch(/tee/)
  })
  it('waits while the two rates cannot be told apart', () => {
    expect(after(0.4, { before: before(0.1, 20).rate }).outcome).toBe('cannot-tell')
    expect(after(0.2, { readings: falling(0.2, 2) }).outcome).toBe('cannot-tell')
    expect(after(0.2, { readings: [] }).outcome).toBe('cannot-tell')
  })
  it('begins again after a run or a flush', () => {
    const run = {
      startedAtMs: 5,
      stoppedAtMs: 9,
      trigger: 'leak' as const,
      vacuumAtStartPa: 1,
      vacuumAtStopPa: 2,
    }
    expect(after(0.2, { runs: [run] }).reason).toMatch(/pump ran/)
    const flushed = falling(0.2, 30).map((reading, index) =>
      index > 60 ? { ...reading, vacuumPa: (reading.vacuumPa ?? 0) - inHgToPa(1) } : reading,
    )
    expect(after(0.2, { readings: flushed }).reason).toMatch(/flushed/)
  })
  it('judges the whole boat where nobody read before', () => {
    expect(after(0.1, { before: null }).outcome).toBe('passed')
    expect(after(1.5, { before: null }).outcome).toBe('cannot-tell')
  })
})
