import { clock, offsetAt } from '@/components/time'
import { durationAndInterval } from '@/components/figures'
import { tonightKind, type TonightFacts } from '@/components/tonight/sentences'
import type { HoldTime } from '@/shared/schemas'
import { formatDuration, formatShare } from '@/shared/units'

const hours = (value: number): string => `${Number(value.toFixed(1))} h`

/** Hold time in an owner's words, with how sure it is: "It stays quiet for 1.4 h between runs (1.2 to 1.6 h)". */
export function quietBetweenRuns(holdTime: HoldTime): string {
  if (holdTime.bound === 'at-least')
    return `It stays quiet for at least ${formatDuration(holdTime.seconds)} between runs`
  const [value, interval] = durationAndInterval(holdTime.seconds, holdTime.low, holdTime.high)
  return `It stays quiet for ${value} between runs${interval === '' ? '' : ` (${interval})`}`
}

function measuredFrom({ summary }: TonightFacts): string {
  const rate = summary.leakRate
  if (rate !== null && rate.legs > 0)
    return ` Measured from ${rate.legs} undisturbed ${rate.legs === 1 ? 'stretch' : 'stretches'} over ${formatDuration(
      rate.hours * 3600,
    )}.`
  const holds = summary.holdTime?.holds ?? 0
  return holds > 0 ? ` Judged from ${holds} ${holds === 1 ? 'pause' : 'pauses'} of the pump.` : ''
}

/** One line beneath the sentence: why it is said, from what, and how sure. Empty when there is nothing to add. */
export function tonightReason(facts: TonightFacts): string {
  const { summary, outlook, offsets } = facts
  const hold = summary.holdTime
  const night = outlook ? `; this night is ${hours(outlook.night.hours)}` : ''
  const quiet = hold ? `${quietBetweenRuns(hold)}${night}.` : ''
  switch (tonightKind(facts)) {
    case 'laid-up':
    case 'worked-on':
      return ''
    case 'unheard':
      return 'Its logger may have lost power or the harbour’s network; the pump works as before.'
    case 'running-on':
      return 'The vacuum is not rising: a bowl valve may hang open, or the pump draws air.'
    case 'off':
      return 'There is no vacuum, and the pump has not started for ten minutes or more.'
    case 'learning':
      return 'A night’s rest and a day’s flushes are enough for a first figure.'
    case 'away': {
      const chance = outlook?.chanceIfFlushedLast ?? null
      const would =
        chance !== null && chance >= 0.5 ? ' With people aboard the pump would be likely to run.' : ''
      return `${quiet}${would}`.trim()
    }
    case 'short-cycling':
      return `${quiet}${measuredFrom(facts)}`.trim()
    case 'likely': {
      const open = outlook !== null && outlook.firstRun !== null && outlook.firstRun.at === null
      const bedtime = open
        ? ` The first time is for a last flush at ${clock(outlook.bedtime, offsetAt(offsets, Date.parse(outlook.bedtime)))}.`
        : ''
      return `${quiet}${bedtime}${measuredFrom(facts)}`.trim()
    }
    case 'flush-last':
      return `${quiet} From a full vacuum it lasts the night; as evenings go here, the chance of a run is ${formatShare(
        outlook?.chance,
      )}.${measuredFrom(facts)}`.trim()
    case 'probably-quiet':
    case 'quiet': {
      const chance = outlook?.chance ?? outlook?.chanceIfFlushedLast ?? null
      const sure =
        chance === null ? '' : ` Chance of a run: ${chance < 0.01 ? 'under 1 %' : formatShare(chance)}.`
      return `${quiet}${sure}${measuredFrom(facts)}`.trim()
    }
  }
}
