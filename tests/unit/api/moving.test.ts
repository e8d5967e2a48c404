import { describe, expect, it } from 'vitest'
import { movingOf } from '@/lib/fleet/moving'

const DAY = 86_400_000
const AT = Date.UTC(2026, 10, 30, 12)
/** Daily rates of the last `count` days, the oldest first. */
const days = (count: number, rate: (day: number) => number) =>
  Array.from({ length: count }, (_, day) => ({ at: AT - (count - day) * DAY, paPerHour: rate(day) }))
const step = (daysAgo: number, from: number, to: number) => ({
  between: [AT - (daysAgo + 0.1) * DAY, AT - daysAgo * DAY] as [number, number],
  fromPaPerHour: from,
  toPaPerHour: to,
  strength: 9,
})
const none = { steps: [], repairedAt: null, at: AT }
/** Alternates a little about a level, so that there is no trend in it. */
const level = (rate: number) => (day: number) => rate * (day % 2 === 0 ? 1.01 : 0.99)

describe('how a leak moves', () => {
  it('is steady where nothing does, and unsaid before five days', () => {
    expect(movingOf({ ...none, days: days(20, level(1000)) })).toEqual({
      word: 'steady',
      since: AT - 20 * DAY,
    })
    expect(movingOf({ ...none, days: days(4, level(1000)) })).toBeNull()
    expect(movingOf({ ...none, days: [] })).toBeNull()
  })

  it('is worse or better by a trend that would double or halve it within three months', () => {
    expect(movingOf({ ...none, days: days(20, (day) => 500 * 1.05 ** day) })?.word).toBe('worse')
    expect(movingOf({ ...none, days: days(20, (day) => 500 * 0.95 ** day) })?.word).toBe('better')
    expect(movingOf({ ...none, days: days(20, (day) => 500 * 1.002 ** day) })?.word).toBe('steady')
  })

  it('has stepped for two weeks, and is compared with the new level afterwards', () => {
    const jump = (daysAgo: number) => ({
      ...none,
      days: days(20, (day) => level(day < 20 - daysAgo ? 400 : 1500)(day)),
      steps: [step(daysAgo, 400, 1500)],
    })
    expect(movingOf(jump(3))).toEqual({ word: 'stepped', since: AT - 3 * DAY })
    expect(movingOf(jump(10))).toEqual({ word: 'stepped', since: AT - 10 * DAY })
    expect(movingOf(jump(15))?.word).toBe('steady')
  })

  it('has held since a repair, until it steps up or grows again', () => {
    const repaired = {
      ...none,
      days: days(20, (day) => level(day < 16 ? 3000 : 300)(day)),
      repairedAt: AT - 4 * DAY,
    }
    const down = step(4, 3000, 300)
    expect(movingOf({ ...repaired, steps: [down] })).toEqual({
      word: 'held-since-repair',
      since: AT - 4 * DAY,
    })
    expect(movingOf({ ...repaired, steps: [down, step(1, 300, 2000)] })?.word).toBe('stepped')
    const growing = days(20, (day) => (day < 10 ? 3000 : 300 * 1.2 ** (day - 10)))
    expect(movingOf({ ...none, days: growing, steps: [], repairedAt: AT - 10 * DAY })?.word).toBe('worse')
  })
})
