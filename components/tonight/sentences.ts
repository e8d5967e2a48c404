import { clock, dayAndClock, offsetAt, type ZoneOffset } from '@/components/time'
import { firstRunToSay, LIKELY, runsToSay, SURELY_QUIET } from '@/components/tonight/night-plan'
import { times, type Phrase } from '@/components/tonight/phrases'
import type { Outlook, Summary } from '@/shared/schemas'
import { formatDuration } from '@/shared/units'

/** All that a sentence about tonight may draw on. `name` is the boat's, with its system's where it has several. */
export type TonightFacts = {
  name: string
  summary: Summary
  outlook: Outlook | null
  offsets: readonly ZoneOffset[]
  nowMs: number
}

/** What the sentence is about; the advice, the reason and the colour follow from it. */
export type TonightKind =
  | 'laid-up'
  | 'worked-on'
  | 'unheard'
  | 'running-on'
  | 'off'
  | 'away'
  | 'learning'
  | 'short-cycling'
  | 'likely'
  | 'flush-last'
  | 'probably-quiet'
  | 'quiet'

/** Which of the sentences fits. What people said and what is wrong now come before what the night may bring. */
export function tonightKind({ summary, outlook }: TonightFacts): TonightKind {
  switch (summary.state) {
    case 'laid-up':
    case 'worked-on':
    case 'unheard':
    case 'running-on':
    case 'off':
      return summary.state
  }
  if (summary.aboard === 'away' || outlook?.aboard === 'away') return 'away'
  if (summary.state === 'short-cycling') return 'short-cycling'
  if (summary.state === 'learning' || outlook === null || outlook.basis === 'learning') return 'learning'
  if (outlook.chance === null && outlook.chanceIfFlushedLast === null) return 'learning'
  if ((outlook.chanceIfFlushedLast ?? 0) >= LIKELY) return 'likely'
  if ((outlook.chance ?? 0) >= LIKELY) return 'flush-last'
  return Math.max(outlook.chance ?? 0, outlook.chanceIfFlushedLast ?? 0) >= SURELY_QUIET
    ? 'probably-quiet'
    : 'quiet'
}

function likely(facts: TonightFacts, outlook: Outlook): Phrase[] {
  const first = firstRunToSay(outlook, facts.summary)
  const count = runsToSay(outlook, facts.summary)
  const phrases: Phrase[] = [
    { text: `${facts.name}’s pump is likely to run ` },
    { text: times(count), strong: 'attention' },
    { text: ' tonight' },
  ]
  if (first !== null) {
    const at = clock(first, offsetAt(facts.offsets, Date.parse(first)))
    const known = outlook.firstRun?.at !== null
    phrases.push({
      text:
        count === 1 ? `, ${known ? 'at' : 'by'} about ${at}` : `, first ${known ? 'at' : 'by'} about ${at}`,
    })
  }
  return [...phrases, { text: '.' }]
}

/** The one large sentence of the Tonight sheet, for an owner. */
export function tonightSentence(facts: TonightFacts): Phrase[] {
  const { name, summary, outlook, offsets, nowMs } = facts
  const say = (text: string): Phrase[] => [{ text }]
  switch (tonightKind(facts)) {
    case 'laid-up':
      return say(`${name} is laid up. Nothing is sent until it is back in use.`)
    case 'worked-on':
      return say(`Somebody is working on ${name}. Warnings wait until they are done.`)
    case 'unheard': {
      if (summary.lastHeardAt === null)
        return say(`${name} has not been heard yet, so tonight cannot be foretold.`)
      const at = dayAndClock(summary.lastHeardAt, offsetAt(offsets, Date.parse(summary.lastHeardAt)), nowMs)
      return say(`Nothing heard from ${name} since ${at}, so tonight cannot be foretold.`)
    }
    case 'running-on':
      return [
        { text: `${name}’s pump ` },
        { text: 'has not stopped', strong: 'attention' },
        { text: summary.since ? ` for ${formatDuration((nowMs - Date.parse(summary.since)) / 1000)}.` : '.' },
      ]
    case 'off':
      return say(`${name}’s pump is off. It will not run tonight, and the toilets will not flush.`)
    case 'away':
      return say(`Nobody is aboard ${name} tonight, so nobody will be woken.`)
    case 'learning':
      return say(`Still getting to know ${name}. After about a day of use the night can be foretold.`)
    case 'short-cycling':
      return [
        { text: `${name}’s pump runs by itself ` },
        {
          text: summary.holdTime ? `every ${formatDuration(summary.holdTime.seconds)}` : 'every few minutes',
          strong: 'attention',
        },
        { text: ', and will all night.' },
      ]
    case 'likely':
      return outlook === null ? [] : likely(facts, outlook)
    case 'flush-last':
      return say(`Flush last thing, and ${name} should stay quiet tonight.`)
    case 'probably-quiet':
      return say(`${name} will probably be quiet tonight.`)
    case 'quiet':
      return say(`${name} should be quiet tonight.`)
  }
}
