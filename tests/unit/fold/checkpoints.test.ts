import { describe, expect, it } from 'vitest'
import {
  blockStart,
  checkpointDue,
  initialState,
  orderItems,
  parseState,
  serialiseState,
  step,
  type Fact,
  type Sample,
} from '@/lib/analysis/fold'
import { story } from './story'
import { fitting, FROM, HOUR, sampleAt } from './worlds'

const EACH_MINUTE = { intervalSeconds: 60 }

function checkpointsOf(samples: readonly Sample[]): number[] {
  const state = initialState()
  const times: number[] = []
  for (const item of orderItems([fitting(FROM, 60)], samples)) {
    step(state, item)
    if (checkpointDue(state) && state.sampleAt !== null) times.push(state.sampleAt)
  }
  return times
}

describe('checkpoints', () => {
  it('fall on the first hold start of each six hours of UTC', () => {
    const told = story(EACH_MINUTE).cycle(24, 2, 8, 10, 47)
    const times = checkpointsOf(told.samples)
    expect(times.length).toBeGreaterThanOrEqual(4)
    expect(new Set(times.map(blockStart)).size).toBe(times.length)
    const stops = told.samples.filter((sample, i) => !sample.pumpOn && told.samples[i - 1]?.pumpOn)
    for (const at of times) {
      const first = stops.find((sample) => sample.at >= blockStart(at))
      expect(at).toBe(first?.at)
    }
  })

  it("fall on a block's first sample after a day without a hold start", () => {
    const told = story(EACH_MINUTE).hold(75 * 3600, 0.001)
    const times = checkpointsOf(told.samples)
    expect(times).toEqual([24, 48, 72].map((hour) => FROM + hour * HOUR))
  })
})

describe('the state as text', () => {
  it('keeps what it is whatever order a store keeps keys in, and refuses what is no state', () => {
    const state = initialState()
    for (const item of orderItems([fitting(FROM, 60)], story(EACH_MINUTE).cycle(3, 2).samples))
      step(state, item)
    const text = serialiseState(state)
    const shuffled = JSON.stringify(Object.fromEntries(Object.entries(JSON.parse(text)).reverse()))
    expect(shuffled).not.toBe(text)
    expect(serialiseState(parseState(shuffled))).toBe(text)
    expect(() => parseState('{}')).toThrow(TypeError)
    expect(() => parseState('nothing')).toThrow(SyntaxError)
  })
})

describe('minus nought', () => {
  it('is nought, as text has it: a state resumed at every sample gives the same rows', () => {
    const told = story(EACH_MINUTE).cycle(2, 2, 8, 10, 47).hold(1200, 1)
    const frost = [0.004, -0, -0.001, -0, 0.002, -0.004]
    const samples = told.samples.map((sample, i) => ({ ...sample, airC: frost[i % 6] ?? null, supplyV: -0 }))
    const items = orderItems([fitting(FROM, 60)], samples)
    let resumed = initialState()
    const whole = initialState()
    for (const item of items) {
      const rows = step(whole, item)
      resumed = parseState(serialiseState(resumed))
      expect(step(resumed, item)).toEqual(rows)
    }
  })
})

describe('the order of items', () => {
  it('is by time, facts first, and leaves its input alone', () => {
    const facts: Fact[] = [
      { kind: 'statement', at: 20, value: 'off' },
      { kind: 'removal', at: 10, loggerId: '1' },
      fitting(10, 60),
      { kind: 'settings', at: 10, settings: { kind: 'unit', cutInPa: null, cutOutPa: null } },
    ]
    const samples = [sampleAt(20, {}), sampleAt(10, {}), sampleAt(5, {})]
    const frozen = [Object.freeze([...facts]), Object.freeze([...samples])] as const
    const items = orderItems(frozen[0], frozen[1])
    expect(items.map((item) => (item.type === 'fact' ? item.fact.kind : item.sample.at))).toEqual([
      5,
      'settings',
      'fitting',
      'removal',
      10,
      'statement',
      20,
    ])
    expect(orderItems([], [])).toEqual([])
  })

  it('is not needed twice: a sample that is no later than the last changes nothing', () => {
    const state = initialState()
    for (const item of orderItems([], story(EACH_MINUTE).cycle(2, 2).samples)) step(state, item)
    const text = serialiseState(state)
    expect(step(state, { type: 'sample', sample: sampleAt(FROM, { vacuumPa: 1, pumpOn: true }) })).toEqual([])
    expect(serialiseState(state)).toBe(text)
  })
})
