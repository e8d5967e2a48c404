import { formatDuration } from '@/shared/units'
import { nightEvidenceSchema, type NightEvidence } from '@/lib/messages/evidence'
import type { Wording } from '@/lib/messages/wording/types'
import type { ToldEvent } from '@/db/queries/notice-events'

/** Words of a night warning: what to expect, how sure, and what to do before going to bed. */
export function nightWording(event: ToldEvent, clock: (hhmm: string) => string): Wording {
  const night = nightEvidenceSchema.parse(event.evidence)
  const times = timesOf(night)
  const hours = `${clock(night.local.from)} and ${clock(night.local.to)}`
  return {
    subject: `the toilet pump is likely to run ${times} tonight`,
    finding: `The pump is likely to run by itself ${times} between ${hours}${firstOf(night, clock)}.`,
    sureness: surenessOf(night, clock),
    steps: [
      'After the last flush wait until the pump has stopped. Then put a cup of water in each bowl: a wet seal leaks far less.',
      'Or switch the pump off at its own breaker, tell everybody aboard that the toilets will not flush, and switch it on again in the morning.',
      'Or ask your shop for a visit.',
    ],
    caution: 'Never switch off a breaker that also feeds a bilge pump.',
    texts: [
      `toilet pump likely to run ${textTimes(night)} tonight, ${textHours(night)}. After the last flush let it stop, then pour a cup of water in each bowl. Reply VISIT or MUTE.`,
      `pump likely to run ${textTimes(night)} tonight, ${textHours(night)}. Last flush, let it stop, then a cup of water in each bowl. Reply VISIT or MUTE.`,
      `pump likely to run ${textTimes(night)} tonight. Last flush, let it stop, then a cup of water in each bowl. VISIT or MUTE?`,
    ],
    short: textTimes(night),
    strip: { quiet: night.strip.quiet, expected: night.strip.expected },
  }
}

/** Runs to expect even when somebody flushes last thing, at least the one the warning is about. */
const runsOf = (night: NightEvidence): number =>
  Math.max(1, Math.round(night.expectedRunsIfFlushedLast ?? night.expectedRuns))

const timesOf = (night: NightEvidence): string => {
  const runs = runsOf(night)
  if (runs === 1) return 'once'
  return runs > 60 ? 'every few minutes' : `about ${runs} times`
}
const textTimes = (night: NightEvidence): string => (runsOf(night) > 60 ? 'all night' : `${runsOf(night)}x`)

/** `22:00` and `07:00` → "22-07"; minutes only where there are some. */
const textHours = (night: NightEvidence): string =>
  `${night.local.from}-${night.local.to}`.replace(/:00/g, '')

function firstOf(night: NightEvidence, clock: (hhmm: string) => string): string {
  const { firstAt, firstAfterBedtime, bedtime } = night.local
  if (firstAt !== null) return `, first at about ${clock(firstAt)}`
  return firstAfterBedtime === null
    ? ''
    : `, first by about ${clock(firstAfterBedtime)} if the last flush is at ${clock(bedtime)}`
}

function surenessOf(night: NightEvidence, clock: (hhmm: string) => string): string {
  const percent = Math.round(night.chanceIfFlushedLast * 100)
  const chance = percent >= 99 ? 'almost certain' : `${percent} % likely`
  const hold =
    night.holdSeconds === null
      ? ''
      : ` The system now holds ${formatDuration(night.holdSeconds)} between runs.`
  const heard = night.heardAtLocal === null ? '' : ` Last heard at ${clock(night.heardAtLocal)}.`
  return `At least one run is ${chance}, even if somebody flushes last thing.${hold}${heard}`
}
