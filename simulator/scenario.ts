import { HISTORY_DAYS } from '@/simulator/scenario/builder'
import { calendarOf } from '@/simulator/scenario/calendar'
import { loggerStories } from '@/simulator/scenario/loggers-and-crews'
import { repairedBoat, steppedBoat, unrepairedBoat } from '@/simulator/scenario/repairs'
import { leakingBoat, plainStories } from '@/simulator/scenario/tight-and-leaking'
import type { DemoScenario } from '@/simulator/scenario/types'

export type * from '@/simulator/scenario/types'
export { eveningZone, type HarbourZone } from '@/simulator/scenario/calendar'

/**
 * The harbour of the demo as data: shops, people, vessels with their stories, all instants relative to the
 * anchor (epoch ms, the moment of first start), local ones by the harbour's fixed offset.
 */
export function demoScenario(options: {
  anchorMs: number
  timeZone: string
  offsetSeconds: number
}): DemoScenario {
  const calendar = calendarOf(options.anchorMs, options.offsetSeconds)
  return {
    ...options,
    historyFromMs: options.anchorMs - HISTORY_DAYS * 86_400_000,
    shops: [
      { key: 'saltern', name: 'Saltern Quay Marine Sanitation', harbour: 'Port Averill' },
      { key: 'stranger', name: 'Eastmere Boat Services', harbour: 'Eastmere' },
    ],
    people: [
      { email: 'manager@saltern.example', name: 'Maren Oakes', shop: 'saltern', roles: ['manager'] },
      { email: 'technician@saltern.example', name: 'Tobias Fenn', shop: 'saltern', roles: ['technician'] },
      { email: 'installer@saltern.example', name: 'Inga Marsh', shop: 'saltern', roles: ['installer'] },
      { email: 'owner@saltern.example', name: 'Oriel Sands', shop: null, roles: [] },
      { email: 'manager@stranger.example', name: 'Magnus Weir', shop: 'stranger', roles: ['manager'] },
      { email: 'owner@stranger.example', name: 'Odile Stone', shop: null, roles: [] },
    ],
    vessels: [
      leakingBoat(calendar),
      repairedBoat(calendar),
      ...plainStories(calendar),
      steppedBoat(calendar),
      unrepairedBoat(calendar),
      ...loggerStories(calendar),
    ],
  }
}
