import type { Trx } from '@/db/roles'
import { localClocks } from '@/db/queries/outlooks'
import type { Outlook } from '@/lib/analysis/outlook/types'
import type { NightEvidence } from '@/lib/messages/evidence'
import { quarterAfter } from '@/shared/quarter'

const STRIP_START_MINUTE = 18 * 60
const DAY_MINUTES = 24 * 60
const MOST_TICKS = 48

/** What a night warning rests on, with all times as the boat's own clock shows them. */
export async function nightEvidence(trx: Trx, timeZone: string, outlook: Outlook): Promise<NightEvidence> {
  const { night, firstRun } = outlook
  const expected = expectedRuns(outlook)
  const by = expected[0] === undefined ? null : quarterAfter(expected[0])
  const instants = [night.from, night.to, night.bedtime, outlook.heardAt, firstRun?.at, by, ...expected]
  const [from = '', to = '', bedtime = '', heard = '', first = '', firstBy = '', ...runs] = await localClocks(
    trx,
    timeZone,
    instants.map((instant) => new Date(instant ?? night.from)),
  )
  return {
    quiet: { from: new Date(night.from).toISOString(), to: new Date(night.to).toISOString() },
    local: {
      from,
      to,
      bedtime,
      firstAt: firstRun === null || firstRun.at === null || firstRun.at > night.to ? null : first,
      firstAfterBedtime: by === null ? null : firstBy,
    },
    chance: outlook.chance,
    chanceIfFlushedLast: outlook.chanceIfFlushedLast ?? 0,
    expectedRuns: outlook.expectedRuns ?? 0,
    expectedRunsIfFlushedLast: outlook.expectedRunsIfFlushedLast,
    holdSeconds: outlook.holdSeconds,
    heardAtLocal: outlook.heardAt === null ? null : heard,
    strip: { quiet: [stripMinute(from), stripMinute(to)], expected: runs.map(stripMinute) },
  }
}

/** Where runs would fall after a last flush at bedtime: what the strip draws, dashed. */
function expectedRuns({ night, holdSeconds }: Outlook): number[] {
  if (holdSeconds === null || holdSeconds <= 0) return []
  const count = Math.min(MOST_TICKS, Math.floor((night.to - night.bedtime) / (holdSeconds * 1000)))
  return Array.from(
    { length: Math.max(0, count) },
    (_, index) => night.bedtime + (index + 1) * holdSeconds * 1000,
  )
}

/** Minutes after 18:00 of a wall clock. `stripMinute('22:00') // 240` */
export function stripMinute(clock: string): number {
  const [hour = 0, minute = 0] = clock.split(':').map(Number)
  return (hour * 60 + minute - STRIP_START_MINUTE + DAY_MINUTES) % DAY_MINUTES
}
