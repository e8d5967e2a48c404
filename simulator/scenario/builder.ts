import { EVENINGS, TWO_ABOARD, type HabitSpec } from '@/simulator/habits'
import type { Channel, LoggerSpec } from '@/simulator/logger'
import type { LeakSpec } from '@/simulator/physics/leaks'
import { seedFromText } from '@/simulator/random'
import { defaultBoat, flowForBoatHold, type BoatOverrides, type BoatSpec } from '@/simulator/spec'
import type { Calendar } from './calendar'
import { headsOf, partsOf } from './plant'
import type { ScenarioSystem, ScenarioVessel } from './types'

export const HISTORY_DAYS = 30
/** How far ahead the stories' calendars reach. */
export const FUTURE_DAYS = 120
const ALL_CHANNELS: Channel[] = ['pump', 'vacuum', 'air', 'barometer', 'supply']

export type LeakStory = Omit<LeakSpec, 'flowPaM3PerS'> & { holdHours: number }
export type SystemStory = {
  vessel: string
  name?: string
  kind?: ScenarioSystem['kind']
  volumeM3?: number
  headNames?: readonly string[]
  flushInHg?: number
  channels?: Channel[]
  leaks: readonly LeakStory[]
  aboard?: HabitSpec['aboard']
  away?: HabitSpec['away']
  habit?: 'two' | 'evenings'
  flushScale?: number
  extraFlushes?: HabitSpec['extraFlushes']
  logger?: Partial<LoggerSpec>
  boat?: BoatOverrides
  statements?: ScenarioSystem['statements']
}

/**
 * One system of the harbour. Each leak is told by the hours for which it alone would let the system hold, so
 * that a story reads as the trade would tell it; all boats of the harbour have the same weather.
 */
export function systemOf(calendar: Calendar, story: SystemStory): ScenarioSystem {
  const volumeM3 = story.volumeM3 ?? 0.04
  const headNames = story.headNames ?? ['Forward head', 'Aft head']
  const name = story.name ?? ''
  const seed = seedFromText(`${story.vessel}/${name}`)
  const habit = story.habit === 'evenings' ? EVENINGS : TWO_ABOARD
  const channels = story.channels ?? ALL_CHANNELS
  const plain = defaultBoat({ volumeM3 })
  const boat: BoatSpec = defaultBoat({
    ...story.boat,
    seed,
    name: name ? `${story.vessel}, ${name}` : story.vessel,
    offsetSeconds: calendar.offsetSeconds,
    weatherSeed: seedFromText('Port Averill'),
    volumeM3,
    leaks: story.leaks.map(({ holdHours, ...leak }) => ({
      ...leak,
      flowPaM3PerS: flowForBoatHold(plain, leak.kind, holdHours * 3600),
    })),
    // A recharge of the switch's band takes about 40 s, whatever the size.
    pump: { displacementM3PerS: 0.004 * volumeM3, ...story.boat?.pump },
    habits: {
      heads: headsOf(volumeM3, headNames.length, story.flushInHg ?? 2.6),
      flushesByHour: habit.map((each) => each * (story.flushScale ?? 1)),
      aboard: story.aboard ?? 'always',
      away: story.away ?? [],
      extraFlushes: story.extraFlushes ?? [],
    },
    logger: { channels, intervalSeconds: 15, slowChannelSeconds: 60, ...story.logger },
  })
  return {
    name,
    kind: story.kind ?? 'pass-through',
    parts: partsOf(volumeM3, headNames),
    pumpAmps: boat.pump.amps,
    lowSupplyV: channels.includes('supply') ? 11.2 : null,
    logger: {
      serial: `MW-${(seed % 0x1000000).toString(16).toUpperCase().padStart(6, '0')}`,
      channels,
      intervalSeconds: 15,
    },
    boat,
    statements: story.statements ?? [],
  }
}

type VesselStory = Pick<ScenarioVessel, 'name' | 'story' | 'berth' | 'systems'> & Partial<ScenarioVessel>
export const vesselOf = (vessel: VesselStory): ScenarioVessel => ({
  harbour: 'Port Averill',
  shop: 'saltern',
  ownerEmail: null,
  fullRecord: false,
  visits: [],
  ...vessel,
})

/** A flush each evening at these local hours, so that somebody is surely seen aboard. */
export const eveningFlushes = (
  calendar: Calendar,
  hours: readonly number[],
): { at: number; head: string }[] =>
  Array.from({ length: HISTORY_DAYS + FUTURE_DAYS }, (_, index) => index - HISTORY_DAYS).flatMap((day) =>
    hours.map((hour, index) => ({
      // Not to the second the same each day.
      at: calendar.at(day, hour) + ((seedFromText(`${day}/${index}`) % 900) - 450) * 1000,
      head: index % 2 === 0 ? 'head-1' : 'head-2',
    })),
  )
