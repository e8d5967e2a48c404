import { describe, expect, it } from 'vitest'
import { simulateBoat, type SimTruth } from '@/simulator/boat'
import { demoScenario, eveningZone } from '@/simulator/scenario'

const HOUR = 3_600_000
const DAY = 24 * HOUR
const anchorMs = Date.UTC(2026, 11, 1, 13, 20)
const zone = eveningZone(anchorMs)
const scenario = demoScenario({ anchorMs, ...zone })
const vesselNamed = (name: string) => {
  const found = scenario.vessels.find((vessel) => vessel.name === name)
  if (!found) throw new Error(name)
  return found
}
const boatOf = (name: string) => {
  const [found] = vesselNamed(name).systems
  if (!found) throw new Error(name)
  return found.boat
}
const truths = new Map<string, SimTruth>()
const truthOf = (name: string): SimTruth => {
  const truth = truths.get(name) ?? simulateBoat(boatOf(name), anchorMs - 30 * DAY, anchorMs).truth
  truths.set(name, truth)
  return truth
}

describe('the harbour zone', () => {
  it('is the one in which it is between eight and nine in the evening, at any hour of the day', () => {
    for (let hour = 0; hour < 24; hour++) {
      const now = Date.UTC(2026, 6, 1, hour, 59)
      const { timeZone, offsetSeconds } = eveningZone(now)
      expect(new Date(now + offsetSeconds * 1000).getUTCHours()).toBe(20)
      expect(offsetSeconds).toBeGreaterThanOrEqual(-12 * 3600)
      expect(offsetSeconds).toBeLessThanOrEqual(14 * 3600)
      const shown = new Intl.DateTimeFormat('en-GB', { timeZone, hour: '2-digit', hourCycle: 'h23' }).format(
        now,
      )
      expect(shown).toBe('20')
    }
  })
})

describe('the demo scenario', () => {
  it('uses reserved addresses only, and serials and names once', () => {
    const emails = [
      ...scenario.people.map((each) => each.email),
      ...scenario.vessels.flatMap((each) => each.ownerEmail ?? []),
    ]
    for (const email of emails) expect(email).toMatch(/@[a-z.]+\.example$/)
    const serials = scenario.vessels.flatMap((vessel) => vessel.systems.map((system) => system.logger.serial))
    expect(new Set(serials).size).toBe(serials.length)
    expect(new Set(scenario.vessels.map((vessel) => vessel.name)).size).toBe(scenario.vessels.length)
    expect(scenario.vessels.length).toBeGreaterThanOrEqual(12)
  })

  it('draws every leak and head as a part, with volumes that add up', () => {
    for (const { systems } of scenario.vessels) {
      for (const { boat, parts } of systems) {
        const keys = parts.map((part) => part.key)
        for (const leak of boat.leaks) expect(keys).toContain(leak.part)
        for (const head of boat.habits.heads) expect(keys).toContain(head.key)
        for (const part of parts) if (part.parent !== null) expect(keys).toContain(part.parent)
        const sum = parts.reduce((total, part) => total + part.volumeM3, 0)
        expect(sum).toBeCloseTo(boat.volumeM3, 3)
      }
    }
  })

  it('is the same for the same anchor', () => {
    expect(demoScenario({ anchorMs, ...zone })).toEqual(scenario)
  })

  it('begins with Saltmarsh Hare, which holds about 1.4 h and is flushed every evening by its owner', () => {
    const [first] = scenario.vessels
    expect(first).toMatchObject({ name: 'Saltmarsh Hare', ownerEmail: 'owner@saltern.example' })
    const truth = truthOf('Saltmarsh Hare')
    expect(truth.holdTimeSeconds(anchorMs) / 3600).toBeCloseTo(1.4, 1)
    for (let day = 0; day < 30; day++) {
      const to = anchorMs - day * DAY
      const evening = truth.flushes.filter((flush) => flush.at >= to - 3.4 * HOUR && flush.at < to)
      expect(evening.length, `evening ${day} days ago`).toBeGreaterThan(0)
    }
  })

  it('tells each story by its hold times', () => {
    const holdHours = (name: string, daysAgo: number) =>
      truthOf(name).holdTimeSeconds(anchorMs - daysAgo * DAY) / 3600
    expect(holdHours('Ninth Wave', 0)).toBeGreaterThan(20)
    expect(holdHours("Corrigan's Luck", 29)).toBeGreaterThan(8)
    expect(holdHours("Corrigan's Luck", 0)).toBeLessThan(4)
    expect(holdHours('Petrichor', 9)).toBeGreaterThan(4 * holdHours('Petrichor', 7))
    expect(holdHours('Blue Finch', 4)).toBeGreaterThan(8)
    expect(holdHours('Blue Finch', 0)).toBeLessThan(10 / 60)
    expect(holdHours("Petrel's Rest", 10)).toBeLessThan(2)
    expect(holdHours("Petrel's Rest", 8)).toBeGreaterThan(12)
    expect(holdHours('Gannet', 7)).toBeCloseTo(holdHours('Gannet', 5), 9)
    expect(holdHours('Marrow of the Sea', 0)).toBeGreaterThan(12)
  })

  it('gives gauge readings in which the whole boat leaks and the cleared side does not', () => {
    const [visit] = vesselNamed("Petrel's Rest").visits
    const [whole, tankSide, , after] = visit?.gaugeTests ?? []
    const lost = (test: typeof whole) => (test ? test.startPa - test.endPa : Number.NaN)
    expect(lost(whole)).toBeGreaterThan(0.2 * 3386)
    expect(lost(tankSide)).toBeLessThan(0.15 * 3386)
    expect(lost(after)).toBeLessThan(0.15 * 3386)
  })
})
