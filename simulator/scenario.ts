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
      { key: 'stranger', name: 'Stranger Sound Boat Plumbing', harbour: 'Grey Sound' },
    ],
    people: [
      { email: 'manager@saltern.example', name: 'Marit Sandhaven', shop: 'saltern', roles: ['manager'] },
      { email: 'technician@saltern.example', name: 'Tobin Reedmace', shop: 'saltern', roles: ['technician'] },
      { email: 'installer@saltern.example', name: 'Ines Kelpwright', shop: 'saltern', roles: ['installer'] },
      { email: 'owner@saltern.example', name: 'Orla Quayle', shop: null, roles: [] },
      { email: 'manager@stranger.example', name: 'Milo Outerbank', shop: 'stranger', roles: ['manager'] },
      { email: 'owner@stranger.example', name: 'Oswin Farrow', shop: null, roles: [] },
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
