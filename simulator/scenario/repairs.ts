import { FUTURE_DAYS, HISTORY_DAYS, eveningFlushes, systemOf, vesselOf } from './builder'
import type { Calendar } from './calendar'
import { gaugeTestOf } from './plant'
import type { ScenarioVessel } from './types'

/** Breaker off while somebody works, opened to the air for the middle of it. */
const working = (calendar: Calendar, day: number, from: number, to: number) => ({
  breakerOff: [{ from: calendar.at(day, from), to: calendar.at(day, to) }],
  vented: [{ from: calendar.at(day, from + 0.7), to: calendar.at(day, to - 0.3) }],
})

export function steppedBoat(calendar: Calendar): ScenarioVessel {
  const { at } = calendar
  const vessel = 'Petrichor'
  return vesselOf({
    name: vessel,
    story: 'A step after other trades worked in the bilge',
    berth: 'A 8',
    systems: [
      systemOf(calendar, {
        vessel,
        leaks: [
          { part: 'tank', kind: 'laminar', holdHours: 18 },
          { part: 'hose-2', kind: 'orifice', holdHours: 3.2, onsetAt: at(-8, 14.6) },
        ],
      }),
    ],
    visits: [
      {
        system: 0,
        complaint: 'Runs at night since the steering gear was seen to.',
        status: 'planned',
        plannedFor: at(2, 10),
        startedAt: null,
        finishedAt: null,
        verdict: null,
        summary: null,
        gaugeTests: [],
        partChanges: [],
      },
    ],
  })
}

export function repairedBoat(calendar: Calendar): ScenarioVessel {
  const { at } = calendar
  const vessel = "Petrel's Rest"
  const day = -9
  const system = systemOf(calendar, {
    vessel,
    habit: 'evenings',
    aboard: calendar.daily(-HISTORY_DAYS - 1, FUTURE_DAYS, 16.5, 33),
    extraFlushes: [...eveningFlushes(calendar, [18.3, 21.5]), { at: at(day, 9.4), head: 'head-1' }],
    leaks: [
      { part: 'tank', kind: 'laminar', holdHours: 15 },
      { part: 'head-2', kind: 'laminar', holdHours: 1.5, curedAt: at(day, 10.9) },
    ],
    boat: working(calendar, day, 9.6, 11.3),
  })
  const all = system.parts.map((part) => part.key)
  const tankSide = ['tank', 'switch', 'pump', 'suction']
  const test = (keys: string[], hour: number, minutes: number) =>
    gaugeTestOf(system.boat, system.parts, keys, at(day, hour), minutes, 9.4)
  return vesselOf({
    name: vessel,
    story: 'Repaired with proof',
    berth: 'B 9',
    ownerEmail: 'owner@saltern.example',
    fullRecord: true,
    systems: [system],
    visits: [
      {
        system: 0,
        complaint: 'Pump runs about every hour and a half at night.',
        status: 'closed',
        plannedFor: at(day, 9),
        startedAt: at(day, 9.5),
        finishedAt: at(day, 11.8),
        verdict: 'held',
        summary: 'Bowl seal of the aft head dry and torn; replaced. Tank side tight. Held all night since.',
        gaugeTests: [
          test(all, 9.7, 15),
          test(tankSide, 10.15, 15),
          test([...tankSide, 'hose-1', 'head-1'], 10.5, 10),
          test(all, 11.45, 15),
        ],
        partChanges: [{ partKey: 'head-2', at: at(day, 10.9), action: 'replaced', detail: 'Bowl seal' }],
      },
    ],
  })
}

export function unrepairedBoat(calendar: Calendar): ScenarioVessel {
  const { at } = calendar
  const vessel = 'Gannet'
  const day = -6
  const system = systemOf(calendar, {
    vessel,
    extraFlushes: [{ at: at(day, 13.4), head: 'head-1' }],
    leaks: [
      { part: 'tank', kind: 'laminar', holdHours: 20 },
      { part: 'hose-1', kind: 'orifice', holdHours: 2.6 },
    ],
    boat: working(calendar, day, 13.6, 15.2),
  })
  const all = system.parts.map((part) => part.key)
  return vesselOf({
    name: vessel,
    story: 'Repaired without effect',
    berth: 'C 12',
    systems: [system],
    visits: [
      {
        system: 0,
        complaint: 'Pump runs two or three times a night.',
        status: 'proving',
        plannedFor: at(day, 13),
        startedAt: at(day, 13.5),
        finishedAt: at(day, 15.3),
        verdict: null,
        summary: 'Check valves replaced as a matter of routine.',
        gaugeTests: [gaugeTestOf(system.boat, system.parts, all, at(day, 13.7), 15, 9.7)],
        partChanges: [
          { partKey: 'pump', at: at(day, 14.6), action: 'replaced', detail: 'Both check valves' },
        ],
      },
    ],
  })
}
