import type { ToldEvent } from '@/db/queries/notice-events'
import type { Units } from '@/shared/schemas/people'
import { recordEvidenceSchema } from '@/lib/messages/evidence'
import { nightWording } from '@/lib/messages/wording/night'
import { ENDED, WORDS } from '@/lib/messages/wording/record'
import type { Wording } from '@/lib/messages/wording/types'

export type { Wording } from '@/lib/messages/wording/types'

/** The words for one event, in the reader's units and clock. */
export function wordingOf(event: ToldEvent, units: Units): Wording {
  if (event.transition === 'ended') return endWording(event)
  if (event.kind === 'night-warning') return nightWording(event, clockOf(units))
  const evidence = recordEvidenceSchema.parse(event.evidence)
  const words = WORDS[event.kind](evidence, units)
  const again = AGAIN[event.transition] ?? ''
  return {
    subject: again + words.subject,
    finding: words.finding,
    sureness: words.sureness,
    steps: words.steps,
    caution: words.caution ?? null,
    texts: [again + words.text],
    short: words.subject,
    strip: null,
  }
}

/** Said before what was said already once. */
const AGAIN: Partial<Record<ToldEvent['transition'], string>> = {
  worsened: 'worse: ',
  escalated: 'nobody has answered: ',
}

function endWording(event: ToldEvent): Wording {
  const end = ENDED[event.kind]
  return {
    subject: end,
    finding: `${end.charAt(0).toUpperCase()}${end.slice(1)}.`,
    sureness: null,
    steps: [],
    caution: null,
    texts: [`${end}.`],
    short: end,
    strip: null,
  }
}

/** Wall-clock text as the reader likes it: "22:00", or "10:00 pm". */
export const clockOf =
  (units: Units) =>
  (hhmm: string): string => {
    if (units.clock !== '12h') return hhmm
    const [hour = 0, minute = 0] = hhmm.split(':').map(Number)
    return `${hour % 12 === 0 ? 12 : hour % 12}:${String(minute).padStart(2, '0')} ${hour < 12 ? 'am' : 'pm'}`
  }
