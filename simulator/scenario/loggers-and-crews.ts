import { driftingClock } from '@/simulator/logger'
import { FUTURE_DAYS, HISTORY_DAYS, systemOf, vesselOf } from './builder'
import type { Calendar } from './calendar'
import type { ScenarioVessel } from './types'

const MINUTE = 60_000

export function loggerStories(calendar: Calendar): ScenarioVessel[] {
  const { at, anchorMs } = calendar
  return [
    vesselOf({
      name: 'Far Meridian',
      story: 'Back from sea: three weeks arrive at once, a few minutes after the start',
      berth: 'Visitor 4',
      systems: [
        systemOf(calendar, {
          vessel: 'Far Meridian',
          volumeM3: 0.055,
          headNames: ['Forward head', 'Midship head', 'Aft head'],
          leaks: [{ part: 'hose-3', kind: 'laminar', holdHours: 10 }],
          logger: { late: [{ from: anchorMs - 21 * 86_400_000, to: anchorMs + 6 * MINUTE }] },
        }),
      ],
    }),
    vesselOf({
      name: 'Slow Tuesday',
      story: 'A clock that gains eleven seconds a day',
      berth: 'D 1',
      systems: [
        systemOf(calendar, {
          vessel: 'Slow Tuesday',
          habit: 'evenings',
          leaks: [{ part: 'switch', kind: 'orifice', holdHours: 12 }],
          logger: { clock: driftingClock(11, at(-HISTORY_DAYS, 0)) },
        }),
      ],
    }),
    vesselOf({
      name: 'Old Percival',
      story: 'A logger silent since two days ago',
      berth: 'D 15',
      systems: [
        systemOf(calendar, {
          vessel: 'Old Percival',
          leaks: [{ part: 'tank', kind: 'laminar', holdHours: 13 }],
          logger: { silent: [{ from: at(-2, 4.2), to: at(FUTURE_DAYS, 0) }] },
        }),
      ],
    }),
    vesselOf({
      name: 'Marrow of the Sea',
      story: 'Two systems on one yacht: one tight, one whose check valve seats differently each time',
      berth: 'Quay 1',
      systems: [
        systemOf(calendar, {
          vessel: 'Marrow of the Sea',
          name: 'Forward',
          volumeM3: 0.06,
          headNames: ['Owner’s head', 'Guest head', 'Day head'],
          leaks: [{ part: 'tank', kind: 'laminar', holdHours: 16 }],
        }),
        systemOf(calendar, {
          vessel: 'Marrow of the Sea',
          name: 'Aft',
          volumeM3: 0.045,
          headNames: ['Crew head', 'Captain’s head'],
          flushScale: 1.6,
          leaks: [
            { part: 'pump', kind: 'laminar', holdHours: 6, reseatsAtRun: 0.45 },
            { part: 'tank', kind: 'laminar', holdHours: 30 },
          ],
        }),
      ],
    }),
    vesselOf({
      name: 'Winterbourne',
      story: 'Laid up',
      berth: 'Yard 9',
      systems: [
        systemOf(calendar, {
          vessel: 'Winterbourne',
          leaks: [{ part: 'head-1', kind: 'laminar', holdHours: 7 }],
          boat: { layUp: [{ from: at(-9, 15.5), to: at(FUTURE_DAYS, 0) }] },
          statements: [{ kind: 'system', value: 'laid-up', until: at(90, 8) }],
        }),
      ],
    }),
    vesselOf({
      name: 'Cold Comfort',
      story: "The second shop's boat, which nobody at Saltern Quay may see",
      berth: 'East pier 2',
      harbour: 'Grey Sound',
      shop: 'stranger',
      ownerEmail: 'owner@stranger.example',
      systems: [
        systemOf(calendar, {
          vessel: 'Cold Comfort',
          leaks: [{ part: 'hose-1', kind: 'laminar', holdHours: 5 }],
        }),
      ],
    }),
  ]
}
