import { FAMILY_WORDS, strengthWords } from '@/components/vessel/before-you-go/words'
import type { Suspect } from '@/shared/schemas'

/** One suspect: what it is and how much it weighs, on what that rests, what to ask and do first, what would overturn it. */
export function SuspectItem({ suspect }: { suspect: Suspect }) {
  const words = FAMILY_WORDS[suspect.family]
  const list = (items: readonly string[]) => [...new Set(items)].join('; ')
  return (
    <li>
      <p className="font-semibold">{words.name}</p>
      <p className="datum">
        {strengthWords(suspect.strength)}: {list(suspect.basis)}
      </p>
      <p className="mt-1">
        {words.ask ? `Ask: ${words.ask} ` : ''}
        {words.first}
      </p>
      <p className="datum mt-1">Overturned by {list(suspect.overturnedBy)}.</p>
    </li>
  )
}
