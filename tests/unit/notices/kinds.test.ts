import { describe, expect, it } from 'vitest'
import { PA_PER_INHG } from '@/shared/units'
import { KINDS } from '@/lib/notices/kinds'
import { figures, holdsOf, HOUR, MINUTE, NOW, record, runsOf } from './record-of'

const held = (seconds: number, low: number, high: number | null, bound: null | 'at-least' = null) => ({
  seconds,
  low,
  high,
  bound,
  holds: 3,
})

describe('every kind', () => {
  it.each(Object.entries(KINDS))('%s finds nothing in an empty record', (_, judge) => {
    const empty = record({ figures: { current: null, holdTime: null, state: 'learning' } })
    expect(judge(empty).is).not.toBe('present')
  })
})

describe('short hold', () => {
  const judge = KINDS['short-hold']

  it('opens by an interval wholly under the limit, with one hold', () => {
    const finding = judge(record({ figures: { holdTime: held(7200, 6900, 7500) } }))
    expect(finding).toMatchObject({
      is: 'present',
      severity: 1.5,
      evidence: { holdSeconds: 7200, limitSeconds: 10_800 },
    })
  })

  it('does not open while the interval reaches over the limit', () => {
    expect(judge(record({ figures: { holdTime: held(9000, 7000, 11_000) } })).is).toBe('unclear')
  })

  it('opens by three holds in a row under the limit, whatever the interval above', () => {
    const holds = holdsOf([110, 120, 115])
    expect(judge(record({ holds, figures: { holdTime: held(9000, 7000, 20_000) } })).is).toBe('present')
    expect(judge(record({ holds: holds.slice(1), figures: { holdTime: held(9000, 7000, 20_000) } })).is).toBe(
      'unclear',
    )
  })

  it('does not count holds that a flush cut short, nor those set aside', () => {
    const holdTime = held(9000, 7000, 20_000)
    expect(judge(record({ holds: holdsOf([-110, -120, -115]), figures: { holdTime } })).is).toBe('unclear')
    const aside = holdsOf([110, 120, 115]).map((hold) => ({ ...hold, setAside: true }))
    expect(judge(record({ holds: aside, figures: { holdTime } })).is).toBe('unclear')
  })

  it('does not open on a bound, nor on readings of last week', () => {
    expect(judge(record({ figures: { holdTime: held(7000, 7000, null, 'at-least') } })).is).toBe('unclear')
    const old = figures().current
    const current = old === null ? null : { ...old, at: NOW - 7 * 24 * HOUR }
    expect(judge(record({ figures: { holdTime: held(7200, 6900, 7500), current } })).is).toBe('unclear')
  })

  it('ends only after three holds and an estimate past the limit by 15 %', () => {
    const good = held(14_400, 14_000, 15_000)
    const end = (minutes: number[], holdTime = good) =>
      judge(record({ holds: holdsOf(minutes), figures: { holdTime } })).is
    expect(end([100, 240, 230, 250])).toBe('absent')
    expect(end([100, 240, 250])).toBe('unclear')
    expect(end([100, 190, 195, 200])).toBe('unclear')
    expect(end([240, 230, 250], held(11_500, 11_000, 12_000))).toBe('unclear')
    // A flush that came late enough says as much as a leak's run.
    expect(end([100, -240, 230, -250])).toBe('absent')
    expect(end([100, -30, 240, -20, 230, -240])).toBe('absent')
  })
})

describe('short cycling', () => {
  const judge = KINDS['short-cycling']

  it('needs three holds in a row under ten minutes, of the last two hours', () => {
    expect(judge(record({ holds: holdsOf([6, 7, 5]) })).is).toBe('present')
    expect(judge(record({ holds: holdsOf([7, 5]) })).is).toBe('unclear')
    expect(judge(record({ holds: holdsOf([6, 11, 5]) })).is).toBe('unclear')
    expect(judge(record({ holds: holdsOf([6, 7, 5], NOW - 3 * HOUR) })).is).toBe('unclear')
  })

  it('does not take a family that flushes for it', () => {
    expect(judge(record({ holds: holdsOf([-6, -7, -5, -4]) })).is).toBe('unclear')
    expect(judge(record({ holds: holdsOf([6, -30, 7, 5]) })).is).toBe('unclear')
  })

  it('ends by three holds past ten minutes with the margin', () => {
    expect(judge(record({ holds: holdsOf([5, 12, 13, 14]) })).is).toBe('absent')
    expect(judge(record({ holds: holdsOf([5, 11, 13, 14]) })).is).toBe('unclear')
  })
})

describe('running on', () => {
  const judge = KINDS['running-on']
  const on = (at: number) => ({
    state: 'running-on' as const,
    since: NOW - 20 * MINUTE,
    reason: 'the pump has been on for 20 min',
    current: { at, vacuumPa: 20_000, pumpOn: true, holdSoFarSeconds: null },
  })

  it('is told while it is so, and not when it is yesterday’s', () => {
    expect(judge(record({ figures: on(NOW - MINUTE) }))).toMatchObject({
      is: 'present',
      evidence: { sinceAt: '2026-03-10T11:40:00.000Z' },
    })
    expect(judge(record({ figures: on(NOW - HOUR) })).is).toBe('unclear')
  })

  it('ends when the pump has stopped', () => {
    expect(judge(record()).is).toBe('absent')
    expect(judge(record({ figures: { ...on(NOW), state: 'leaking' } })).is).toBe('unclear')
  })
})

describe('no start', () => {
  const judge = KINDS['no-start']
  const off = { state: 'off' as const, since: NOW - HOUR, reason: 'at 2 inHg' }
  const flush = (at: number, startedPump = false) => [{ at, dropPa: 9000, startedPump, knownAt: at }]

  it('needs a flush that took the vacuum and did not start the pump', () => {
    expect(judge(record({ figures: off, flushes: flush(NOW - HOUR) })).is).toBe('present')
    expect(judge(record({ figures: off })).is).toBe('unclear')
    expect(judge(record({ figures: off, flushes: flush(NOW - HOUR, true) })).is).toBe('unclear')
    expect(judge(record({ figures: off, flushes: flush(NOW - 5 * HOUR) })).is).toBe('unclear')
  })

  it('ends when the system is no longer off', () => {
    expect(judge(record()).is).toBe('absent')
  })
})

describe('slow recharge', () => {
  const judge = KINDS['slow-recharge']
  const usual = figures({
    signs: {
      now: figures().signs.now,
      usual: { ...figures().signs.usual, rechargePaPerSecond: 150 },
    },
  })

  it('needs five runs in a row half as slow again', () => {
    expect(judge(record({ figures: usual, runs: runsOf([150, 90, 95, 100, 99, 98]) }))).toMatchObject({
      is: 'present',
    })
    expect(judge(record({ figures: usual, runs: runsOf([90, 95, 140, 99, 98]) })).is).toBe('unclear')
    expect(judge(record({ figures: usual, runs: runsOf([90, 95, 99, 98]) })).is).toBe('unclear')
  })

  it('ends after three quick ones', () => {
    expect(judge(record({ figures: usual, runs: runsOf([90, 95, 140, 150, 145]) })).is).toBe('absent')
  })

  it('passes over runs whose recharge could not be measured', () => {
    expect(judge(record({ figures: usual, runs: runsOf([90, null, 95, 100, null, 99, 98]) })).is).toBe(
      'present',
    )
  })
})

describe('switch drift', () => {
  const judge = KINDS['switch-drift']
  const differential = (now: number, usual: number) => {
    const { signs } = figures()
    return {
      signs: {
        now: { ...signs.now, differentialPa: now * PA_PER_INHG },
        usual: { ...signs.usual, differentialPa: usual * PA_PER_INHG },
      },
    }
  }

  it('is a quarter or 0.4 inHg of the differential', () => {
    expect(judge(record({ figures: differential(1.55, 2) })).is).toBe('present')
    expect(judge(record({ figures: differential(1.65, 2) })).is).toBe('unclear')
    expect(judge(record({ figures: differential(1.8, 2) })).is).toBe('absent')
    expect(judge(record({ figures: differential(0.7, 1) })).is).toBe('present')
  })

  it('is a point more than 1 inHg off its set-up', () => {
    expect(judge(record({ figures: { cutOutPa: 33_864 - 1.1 * PA_PER_INHG } })).is).toBe('present')
    expect(judge(record({ figures: { cutInPa: 27_091 + 0.5 * PA_PER_INHG } })).is).toBe('absent')
  })
})

describe('sensor fault, supply and frost', () => {
  it('a fault stands for a day of readings', () => {
    const fault = (hours: number) => [
      {
        kind: 'stuck',
        startedAt: NOW - 60 * HOUR,
        endedAt: NOW - hours * HOUR,
        detail: 'the reading has not moved',
      },
    ]
    expect(KINDS['sensor-fault'](record({ faults: fault(2) }))).toMatchObject({
      is: 'present',
      reason: 'The reading has not moved',
    })
    expect(KINDS['sensor-fault'](record({ faults: fault(30) })).is).toBe('absent')
  })

  it('the supply is low when all of half an hour is under the set figure', () => {
    const supply = (lowestV: number, highestV: number, count = 20) => ({ lowestV, highestV, count })
    expect(KINDS['low-supply'](record({ supply: supply(11.4, 11.7) })).is).toBe('present')
    expect(KINDS['low-supply'](record({ supply: supply(11.4, 11.9) })).is).toBe('unclear')
    expect(KINDS['low-supply'](record({ supply: supply(11.4, 11.7, 2) })).is).toBe('unclear')
    expect(KINDS['low-supply'](record({ supply: supply(12.2, 12.6) })).is).toBe('absent')
  })

  it('frost is told under 3 °C and over at 4 °C', () => {
    const air = (airC: number, at = NOW) => ({ at, airC })
    expect(KINDS.freeze(record({ air: air(2.9) })).is).toBe('present')
    expect(KINDS.freeze(record({ air: air(3) })).is).toBe('unclear')
    expect(KINDS.freeze(record({ air: air(4) })).is).toBe('absent')
    expect(KINDS.freeze(record({ air: air(1, NOW - 7 * HOUR) })).is).toBe('unclear')
  })
})
