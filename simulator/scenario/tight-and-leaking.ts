import { FUTURE_DAYS, HISTORY_DAYS, eveningFlushes, systemOf, vesselOf } from './builder'
import type { Calendar } from './calendar'
import type { ScenarioVessel } from './types'

/** Somebody aboard from late afternoon to morning, every day. */
const evenings = (calendar: Calendar) => calendar.daily(-HISTORY_DAYS - 1, FUTURE_DAYS, 16.5, 33)

export function leakingBoat(calendar: Calendar): ScenarioVessel {
  const vessel = 'Saltmarsh Hare'
  return vesselOf({
    name: vessel,
    story: 'Clearly leaking, with people aboard every evening',
    berth: 'B 14',
    ownerEmail: 'owner@saltern.example',
    fullRecord: true,
    systems: [
      systemOf(calendar, {
        vessel,
        habit: 'evenings',
        aboard: evenings(calendar),
        extraFlushes: eveningFlushes(calendar, [17.8, 19.4, 21.7]),
        leaks: [
          { part: 'hose-2', kind: 'orifice', holdHours: 2 },
          { part: 'head-1', kind: 'laminar', holdHours: 4.7 },
        ],
        statements: [{ kind: 'aboard', value: true, until: null }],
      }),
    ],
    visits: [
      {
        system: 0,
        complaint: 'The toilet pump wakes us several times a night.',
        status: 'asked',
        plannedFor: null,
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

export function plainStories(calendar: Calendar): ScenarioVessel[] {
  const { at } = calendar
  const weekend = (day: number): boolean => [5, 6].includes(calendar.weekday(day))
  return [
    vesselOf({
      name: 'Ninth Wave',
      story: 'Tight for months',
      berth: 'A 3',
      systems: [
        systemOf(calendar, {
          vessel: 'Ninth Wave',
          leaks: [{ part: 'tank', kind: 'laminar', holdHours: 24 }],
        }),
      ],
    }),
    vesselOf({
      name: "Corrigan's Luck",
      story: 'Weeping and getting worse',
      berth: 'C 22',
      systems: [
        systemOf(calendar, {
          vessel: "Corrigan's Luck",
          leaks: [
            { part: 'tank', kind: 'laminar', holdHours: 40 },
            {
              part: 'hose-1',
              kind: 'laminar',
              holdHours: 17,
              growsFrom: at(-HISTORY_DAYS, 0),
              doublingDays: 14,
              growthLimit: 16,
            },
          ],
        }),
      ],
    }),
    vesselOf({
      name: 'Blue Finch',
      story: 'Short cycling since three days ago',
      berth: 'B 2',
      systems: [
        systemOf(calendar, {
          vessel: 'Blue Finch',
          volumeM3: 0.024,
          headNames: ['Head'],
          leaks: [
            { part: 'tank', kind: 'laminar', holdHours: 9 },
            { part: 'head-1', kind: 'orifice', holdHours: 0.13, onsetAt: at(-3, 7.3) },
          ],
        }),
      ],
      visits: [
        {
          system: 0,
          complaint: 'Pump starts every few minutes, day and night.',
          status: 'planned',
          plannedFor: at(1, 9),
          startedAt: null,
          finishedAt: null,
          verdict: null,
          summary: null,
          gaugeTests: [],
          partChanges: [],
        },
      ],
    }),
    vesselOf({
      name: 'Harbour Lark',
      story: 'A pump that slows',
      berth: 'D 7',
      systems: [
        systemOf(calendar, {
          vessel: 'Harbour Lark',
          leaks: [{ part: 'suction', kind: 'laminar', holdHours: 9.5 }],
          boat: { pump: { wear: [{ from: at(-24, 0), perDay: 0.022 }] } },
        }),
      ],
    }),
    vesselOf({
      name: 'Quillon',
      story: 'A tank that fills and is pumped out',
      berth: 'A 11',
      systems: [
        systemOf(calendar, {
          vessel: 'Quillon',
          kind: 'collecting',
          volumeM3: 0.075,
          leaks: [{ part: 'tank', kind: 'laminar', holdHours: 8 }],
          boat: {
            tank: {
              collects: true,
              filledAtStartM3: 0.01,
              pumpOuts: [-25, -20, -15, -10, -5, 0, 5, 10, 15, 20, 25, 30].map((day) => ({
                at: at(day, 10.4),
                minutes: 12,
              })),
            },
          },
        }),
      ],
    }),
    vesselOf({
      name: 'Wick and Ember',
      story: 'A logger on the pump alone',
      berth: 'C 5',
      systems: [
        systemOf(calendar, {
          vessel: 'Wick and Ember',
          channels: ['pump'],
          leaks: [{ part: 'hose-1', kind: 'laminar', holdHours: 2.2 }],
        }),
      ],
    }),
    vesselOf({
      name: 'Lanternfish',
      story: 'A logger on the vacuum alone',
      berth: 'C 6',
      systems: [
        systemOf(calendar, {
          vessel: 'Lanternfish',
          channels: ['vacuum'],
          aboard: calendar.daily(-HISTORY_DAYS - 1, FUTURE_DAYS, 17, 55, weekend),
          leaks: [{ part: 'head-2', kind: 'laminar', holdHours: 6 }],
        }),
      ],
    }),
  ]
}
