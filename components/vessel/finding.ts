import { clock, dayAndClock, offsetAt, type ZoneOffset } from '@/components/time'
import { durationAndInterval } from '@/components/figures'
import { firstRunToSay, LIKELY, runsToSay } from '@/components/tonight/night-plan'
import { times, type Phrase } from '@/components/tonight/phrases'
import { STATE_WORDS } from '@/components/states'
import type { Cause, Outlook, Step, Summary } from '@/shared/schemas'
import { formatDuration, formatRate, formatRateRange, type VacuumUnit } from '@/shared/units'

function holds(summary: Summary): Phrase[] {
  const hold = summary.holdTime
  if (hold === null) return []
  if (hold.bound === 'at-least')
    return [{ text: ' Holds ' }, { text: `at least ${formatDuration(hold.seconds)}`, strong: 'ink' }]
  const [value, interval] = durationAndInterval(hold.seconds, hold.low, hold.high)
  return [
    { text: ' Holds ' },
    { text: value, strong: 'ink' },
    { text: interval === '' ? '' : ` (${interval})` },
  ]
}

function tonight(outlook: Outlook | null, summary: Summary, offsets: readonly ZoneOffset[]): Phrase[] {
  if (outlook === null || outlook.basis === 'learning' || outlook.chanceIfFlushedLast === null) return []
  if (outlook.chanceIfFlushedLast < LIKELY)
    return [
      {
        text:
          (outlook.chance ?? 0) >= LIKELY
            ? '; quiet tonight if flushed last thing'
            : '; should be quiet tonight',
      },
    ]
  const first = firstRunToSay(outlook, summary)
  const at = first === null ? '' : clock(first, offsetAt(offsets, Date.parse(first)))
  return [
    { text: ', and would run about ' },
    { text: times(runsToSay(outlook, summary)), strong: 'ink' },
    { text: ' tonight' },
    ...(first === null ? [] : [{ text: ', first by about ' }, { text: at, strong: 'ink' as const }]),
  ]
}

/** State, hold time with its interval, and tonight: the sentence that opens a vessel's sheet, in trade terms. */
export function vesselFinding(
  summary: Summary,
  outlook: Outlook | null,
  offsets: readonly ZoneOffset[],
  nowMs: number,
): Phrase[] {
  const word = STATE_WORDS[summary.state]
  switch (summary.state) {
    case 'laid-up':
    case 'worked-on':
    case 'learning':
    case 'unheard':
    case 'off': {
      const since = summary.since
      const at =
        since === null ? '' : ` since ${dayAndClock(since, offsetAt(offsets, Date.parse(since)), nowMs)}`
      return [{ text: `${word}${at}.` }]
    }
    default: {
      const said = [...holds(summary), ...tonight(outlook, summary, offsets)]
      return said.length === 0 ? [{ text: `${word}.` }] : [{ text: `${word}.` }, ...said, { text: '.' }]
    }
  }
}

const CAUSES: Record<Cause, string> = {
  leak: 'The leak has grown; pump, switch and gas space are as they were.',
  pump: 'The pump draws slower while the leak is as it was: pump, voltage or discharge.',
  switch: 'The switch’s differential has narrowed; the leak is as it was.',
  'gas-space': 'The gas space has shrunk: the tank is filling, and the leak flow is as it was.',
}

/** What the finding rests on: rate with interval, legs and hours, corrected or not, cause, and the last step. */
export function vesselBasis(
  summary: Summary,
  steps: readonly Step[],
  unit: VacuumUnit,
  offsets: readonly ZoneOffset[],
  nowMs: number,
): string {
  const parts: string[] = []
  const rate = summary.leakRate
  if (rate !== null) {
    parts.push(
      `${formatRate(rate.paPerHour, unit)} (${formatRateRange(rate.low, rate.high, unit)}) from ${rate.legs} ${
        rate.legs === 1 ? 'leg' : 'legs'
      } over ${formatDuration(rate.hours * 3600)}, ${
        rate.compensated
          ? 'corrected for temperature and barometer'
          : 'not corrected for temperature or barometer'
      }.`,
    )
  } else if (summary.holdTime !== null && summary.holdTime.holds > 0) {
    parts.push(
      `From ${summary.holdTime.holds} ${summary.holdTime.holds === 1 ? 'hold' : 'holds'} of the pump.`,
    )
  }
  if (summary.cause !== null) parts.push(CAUSES[summary.cause])
  const step = steps[steps.length - 1]
  if (step) {
    const [from, to] = step.between
    const at = (instant: string) => dayAndClock(instant, offsetAt(offsets, Date.parse(instant)), nowMs)
    parts.push(
      `It stepped ${step.toPaPerHour > step.fromPaPerHour ? 'up' : 'down'}, ${formatRateRange(
        step.fromPaPerHour,
        step.toPaPerHour,
        unit,
      )}, between ${at(from)} and ${at(to)}.`,
    )
  }
  return parts.join(' ')
}
