import { describe, expect, test } from 'vitest'
import { causeOf, figuresOf, type Figures, type FiguresInput } from '@/lib/analysis/figures'
import { AT, DAY_MS, HOUR_MS, hold, INHG, lawOf, leg, run } from './record-rows'

const EMPTY: FiguresInput = {
  at: AT,
  rows: { runs: [], holds: [], flushes: [], legs: [] },
  open: { run: null, hold: null, leg: null },
  current: { at: AT, vacuumPa: 9 * INHG, pumpOn: false, airC: 20, barometerPa: 101_325, supplyV: 12.6 },
  learned: {
    cutOutPa: 10 * INHG,
    settledPa: 9.9 * INHG,
    cutInPa: 8 * INHG,
    rechargePaPerSecond: 100,
    readings: { cutOut: 20, cutIn: 20 },
    stepPa: 34,
  },
  condition: { offSince: null, runningOnSince: null },
  settings: {
    kind: 'pass-through',
    cutOutPa: 10 * INHG,
    cutInPa: 8 * INHG,
    limitSeconds: 10_800,
    aimSeconds: 28_800,
    silenceSeconds: 21_600,
    pumpAmps: 6,
    altitudeM: 0,
    channels: { pump: true, vacuum: true },
    intervalSeconds: 60,
  },
  statement: null,
  lastHeardAt: AT,
}

/** A day of a boat that holds for `hours`: leak-ended holds and their legs. */
function boatOf(hours: number, over: Partial<FiguresInput> = {}): FiguresInput {
  const count = Math.min(200, Math.floor(24 / hours))
  const law = lawOf((2 * INHG) / hours)
  const starts = Array.from({ length: count }, (_, i) => AT - (count - i) * hours * HOUR_MS)
  return {
    ...EMPTY,
    rows: {
      runs: starts.map((at) => run(at + hours * HOUR_MS - 5_000, 5)),
      holds: starts.map((at) => hold(at, hours * 3600 - 5)),
      flushes: [],
      legs: hours < 0.3 ? [] : starts.map((at) => leg(at + 90_000, Math.floor(hours * 3600 - 200), law)),
    },
    ...over,
  }
}

describe('state, the first that fits', () => {
  test.each([
    [0.1, 'short-cycling'],
    [2, 'leaking'],
    [5, 'weeping'],
    [11, 'tight'],
  ])('a hold of %s h is %s', (hours, state) => {
    const figures = figuresOf(boatOf(hours))
    expect(figures.state).toBe(state)
    expect(Math.abs((figures.holdTime?.seconds ?? 0) / 3600 / hours - 1)).toBeLessThan(0.05)
  })

  test('nothing heard yet is unheard, heard with no rows is learning', () => {
    expect(figuresOf({ ...EMPTY, lastHeardAt: null }).state).toBe('unheard')
    const learning = figuresOf(EMPTY)
    expect(learning.state).toBe('learning')
    expect([learning.holdTime, learning.leakRate, learning.model, learning.pump]).toEqual([
      null,
      null,
      null,
      null,
    ])
  })

  test('silence rules over everything, what people say over readings, running on over off', () => {
    const condition = { offSince: AT - HOUR_MS, runningOnSince: AT - 600_000 }
    const openRun = { ...run(AT - 1_200_000, 60) }
    const all = boatOf(2, {
      condition,
      open: { run: openRun, hold: null, leg: null },
      statement: { value: 'laid-up', since: AT - DAY_MS },
      lastHeardAt: AT - 7 * HOUR_MS,
    })
    expect(figuresOf(all).state).toBe('unheard')
    const heard = { ...all, lastHeardAt: AT }
    expect(figuresOf(heard)).toMatchObject({ state: 'laid-up', since: AT - DAY_MS })
    expect(figuresOf({ ...heard, statement: { value: 'worked-on', since: AT } }).state).toBe('worked-on')
    const unsaid = { ...heard, statement: null }
    expect(figuresOf(unsaid)).toMatchObject({ state: 'running-on', since: AT - 1_200_000 })
    const still = { ...unsaid, open: EMPTY.open, condition: { ...condition, runningOnSince: null } }
    expect(figuresOf(still)).toMatchObject({ state: 'off', since: AT - HOUR_MS })
    expect(figuresOf({ ...still, condition: EMPTY.condition }).state).toBe('leaking')
  })

  test('said to be off is off, whatever the record holds', () => {
    expect(figuresOf(boatOf(11, { statement: { value: 'off', since: AT - 5 } })).state).toBe('off')
  })

  test('exactly at the limit is not under it', () => {
    const settings = { ...EMPTY.settings, limitSeconds: 1, aimSeconds: 2 }
    expect(figuresOf(boatOf(2, { settings })).state).toBe('tight')
  })

  test('on-demand systems have no hold time', () => {
    const figures = figuresOf(boatOf(2, { settings: { ...EMPTY.settings, kind: 'on-demand' } }))
    expect(figures.holdTime).toBeNull()
    expect(figures.reason).toContain('does not apply')
  })
})

describe('figures', () => {
  test('since: the start of the unbroken row of holds that agree', () => {
    const before = boatOf(11)
    const after = boatOf(2)
    const changed = AT - 8 * HOUR_MS
    const mixed: FiguresInput = {
      ...EMPTY,
      rows: {
        runs: [],
        flushes: [],
        holds: [
          ...before.rows.holds.map((one) => hold(one.startedAt - DAY_MS, 11 * 3600)),
          ...after.rows.holds.filter((one) => one.startedAt >= changed),
        ],
        legs: after.rows.legs.filter((one) => one.startedAt >= changed),
      },
    }
    const figures = figuresOf(mixed)
    expect(figures.state).toBe('leaking')
    expect(figures.since).toBe(changed)
  })

  test('leak rate and hold time are one rule: differential over rate', () => {
    const { leakRate, holdTime, cutOutPa, cutInPa } = figuresOf(boatOf(3))
    expect(((cutOutPa ?? 0) - (cutInPa ?? 0)) / (leakRate?.paPerHour ?? 1)).toBeCloseTo(
      (holdTime?.seconds ?? 0) / 3600,
      6,
    )
    expect(leakRate?.compensated).toBe(true)
  })

  test('a day of the pump: runs, seconds and ampere-hours scaled to what was heard', () => {
    const pump = figuresOf(boatOf(2)).pump
    expect(pump?.runsPerDay).toBeCloseTo(12, 0)
    expect(pump?.ampHoursPerDay).toBeCloseTo(((pump?.pumpSecondsPerDay ?? 0) / 3600) * 6, 6)
  })

  test('hold so far counts to what was heard last', () => {
    const open = { ...EMPTY.open, hold: { ...hold(AT - HOUR_MS, 60) } }
    const figures = figuresOf({ ...EMPTY, open, lastHeardAt: AT - 600_000 })
    expect(figures.current?.holdSoFarSeconds).toBe(3000)
  })

  test('worst first: short cycling before leaking, the shorter hold before the longer', () => {
    const rank = (hours: number) => figuresOf(boatOf(hours)).rank
    expect(rank(0.1)).toBeLessThan(rank(1))
    expect(rank(1)).toBeLessThan(rank(2))
    expect(rank(2)).toBeLessThan(rank(11))
  })

  test('the same input gives the same figures, and is not changed', () => {
    const input = boatOf(2)
    const before = JSON.stringify(input)
    expect(figuresOf(input)).toEqual(figuresOf(input))
    expect(JSON.stringify(input)).toBe(before)
  })
})

describe('cause, by r, R, D and K', () => {
  const signs = (rate: number, recharge: number, differential: number): Figures['signs']['now'] => ({
    ratePaPerSecond: rate,
    rechargePaPerSecond: recharge,
    differentialPa: differential,
    ratio: rate / (rate + recharge),
  })
  const usual = signs(0.5, 100, 6800)
  test.each([
    [signs(1, 100, 6800), 'leak'],
    [signs(0.5, 60, 6800), 'pump'],
    [signs(0.5, 100, 4500), 'switch'],
    [signs(0.8, 160, 6800), 'gas-space'],
    [signs(1, 60, 6800), 'leak'],
    [signs(0.5, 100, 6800), null],
  ])('%j: %s', (now, cause) => {
    expect(causeOf('tight', { now, usual })).toBe(cause)
  })

  test('a system that leaks with nothing to compare with leaks', () => {
    const nothing = { ratePaPerSecond: null, rechargePaPerSecond: null, differentialPa: null, ratio: null }
    expect(causeOf('leaking', { now: nothing, usual: nothing })).toBe('leak')
    expect(causeOf('learning', { now: nothing, usual: nothing })).toBeNull()
  })
})
