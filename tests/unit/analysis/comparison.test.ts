import { describe, expect, test } from 'vitest'
import { compareBeforeAfter, type ComparedHold, type ComparedPeriod } from '@/lib/analysis/comparison'
import { inHgToPa } from '@/shared/units'

const HOUR_MS = 3_600_000
const DIFFERENTIAL_PA = inHgToPa(2)
const LIMIT = { limitSeconds: 3 * 3600, pumpAmps: 6 }

type Spec = {
  hours: number[]
  endings?: ComparedHold['ending'][]
  from?: number
  recharge?: number
  rates?: boolean
  differentialPa?: number
}

/** Holds one after another, a minute's run between them, each rate known to a tenth unless told otherwise. */
function period({
  hours,
  endings = [],
  from = 0,
  recharge = 170,
  rates = true,
  differentialPa = DIFFERENTIAL_PA,
}: Spec): ComparedPeriod {
  let at = from
  const holds = hours.map((length, index): ComparedHold => {
    const startedAt = at
    const endedAt = startedAt + length * HOUR_MS
    at = endedAt + 60_000
    const paPerHour = differentialPa / length
    const ending = endings[index] ?? 'leak'
    return {
      startedAt,
      endedAt,
      ending,
      leakRate:
        rates && ending === 'leak' ? { paPerHour, low: 0.9 * paPerHour, high: 1.1 * paPerHour } : null,
    }
  })
  const runs = holds.map((hold) => ({
    startedAt: hold.endedAt,
    stoppedAt: hold.endedAt + 60_000,
    rechargePaPerSecond: recharge,
  }))
  return { from, to: at, holds, runs, differentialPa }
}
const LEAKING = [0.9, 1, 1.1, 0.95, 1.05, 1.02, 0.98, 1.08, 0.93, 1]
const SOUND = [9, 10, 11, 9.5, 10.4]

describe('verdict', () => {
  test('held', () => {
    const result = compareBeforeAfter(period({ hours: LEAKING }), period({ hours: SOUND }), LIMIT)
    expect(result.verdict).toBe('held')
    expect(result.hoursNeeded).toBeNull()
    expect(result.ratio?.value).toBeCloseTo(10, 0)
    expect(result.ratio?.low ?? 0).toBeGreaterThan(8)
    expect(result.pValue ?? 1).toBeLessThan(0.01)
  })

  test('held although people flushed all along', () => {
    const cut = period({
      hours: [3.2, 5, 4.1, 6, 3.5],
      endings: ['flush', 'flush', 'flush', 'flush', 'flush'],
    })
    const result = compareBeforeAfter(period({ hours: LEAKING }), cut, LIMIT)
    expect(result.verdict).toBe('held')
    expect(result.ratio?.high).toBeNull()
    expect(result.after.holdTimeSeconds).toBeNull()
  })

  test('better, but still under the limit', () => {
    const result = compareBeforeAfter(
      period({ hours: LEAKING }),
      period({ hours: [2, 2.1, 1.9, 2.2, 2] }),
      LIMIT,
    )
    expect(result.verdict).toBe('better-under-limit')
  })

  test('no change, and worse', () => {
    expect(
      compareBeforeAfter(period({ hours: LEAKING }), period({ hours: [...LEAKING].reverse() }), LIMIT)
        .verdict,
    ).toBe('no-change')
    expect(
      compareBeforeAfter(period({ hours: LEAKING }), period({ hours: [0.5, 0.6, 0.52, 0.55] }), LIMIT)
        .verdict,
    ).toBe('worse')
  })

  test('a pumped-out tank is not taken for a repair', () => {
    const result = compareBeforeAfter(
      period({ hours: LEAKING }),
      period({ hours: LEAKING.map((hours) => 2 * hours), recharge: 85 }),
      LIMIT,
    )
    expect(result).toMatchObject({ verdict: 'no-change', because: 'gas-space' })
    expect(result.signs.after.ratio).toBeCloseTo(result.signs.before.ratio ?? 0, 3)
  })

  test('a widened differential is named', () => {
    const result = compareBeforeAfter(
      period({ hours: LEAKING }),
      period({ hours: LEAKING.map((hours) => 2 * hours), differentialPa: 2 * DIFFERENTIAL_PA }),
      LIMIT,
    )
    expect(result.because).toBe('switch')
  })
})

describe('too early to say', () => {
  test('nothing after', () => {
    const result = compareBeforeAfter(period({ hours: LEAKING }), period({ hours: [] }), LIMIT)
    expect(result).toMatchObject({ verdict: 'too-early', ratio: null, pValue: null })
    // Three holds of the hour that they last so far.
    expect(result.hoursNeeded).toBe(3)
    expect(result.after).toMatchObject({ holds: 0, holdTimeSeconds: null, leakRatePaPerHour: null })
  })

  test('one short hold after, cut by a flush', () => {
    const after = period({ hours: [0.5], endings: ['flush'] })
    const result = compareBeforeAfter(period({ hours: LEAKING }), after, LIMIT)
    expect(result.verdict).toBe('too-early')
    expect(result.hoursNeeded).toBeGreaterThan(0)
  })
})

describe('what counts', () => {
  test('interrupted and worked-on holds are left out', () => {
    const before = period({
      hours: [...LEAKING, 40, 40],
      endings: [...LEAKING.map(() => 'leak' as const), 'interrupted', 'interrupted'],
    })
    const worked = { ...before, holds: before.holds.map((hold, index) => ({ ...hold, setAside: index < 2 })) }
    expect(compareBeforeAfter(before, period({ hours: SOUND }), LIMIT).before.holds).toBe(10)
    expect(compareBeforeAfter(worked, period({ hours: SOUND }), LIMIT).before.holds).toBe(8)
  })

  test('a hold cut short stands for what its own leak rate says it would have lasted', () => {
    const after = period({ hours: SOUND })
    const short = after.holds.map((hold) => ({
      ...hold,
      endedAt: hold.startedAt + HOUR_MS,
      ending: 'flush' as const,
    }))
    const result = compareBeforeAfter(period({ hours: LEAKING }), { ...after, holds: short }, LIMIT)
    expect(result.verdict).toBe('held')
    expect(result.after.holdTimeSeconds).toBeCloseTo(10 * 3600, -1)
  })

  test('without a vacuum channel a run that a flush started cut the hold short', () => {
    const after = period({
      hours: [4, 4.5, 3.9, 5],
      endings: ['unknown', 'unknown', 'unknown', 'unknown'],
      rates: false,
    })
    const byFlush = {
      ...after,
      differentialPa: null,
      runs: after.runs.map((run) => ({ ...run, trigger: 'flush' as const })),
    }
    const before = { ...period({ hours: LEAKING, rates: false }), differentialPa: null }
    expect(compareBeforeAfter(before, byFlush, LIMIT).ratio?.high).toBeNull()
    expect(compareBeforeAfter(before, { ...after, differentialPa: null }, LIMIT).ratio?.high).not.toBeNull()
  })

  test('runs a day, pump seconds and ampere-hours over the hours observed', () => {
    const before = { ...period({ hours: LEAKING }), observedSeconds: 43_200 }
    const { before: figures } = compareBeforeAfter(before, period({ hours: SOUND }), LIMIT)
    expect(figures.runsPerDay).toBeCloseTo(20, 9)
    expect(figures.pumpSecondsPerDay).toBeCloseTo(1200, 9)
    expect(figures.ampHoursPerDay).toBeCloseTo(2, 9)
    expect(compareBeforeAfter(before, before, { limitSeconds: 1 }).before.ampHoursPerDay).toBeNull()
  })
})
