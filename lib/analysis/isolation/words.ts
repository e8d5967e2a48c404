import type { IsolationPart } from './types'

/** "the fore head, its hose and 2 more": names in a sentence, at most four of them. */
export function nameParts(keys: readonly string[], parts: readonly IsolationPart[]): string {
  const names = keys.map((key) => parts.find((part) => part.key === key)?.name ?? key)
  if (names.length > 4) return `${names.slice(0, 3).join(', ')} and ${names.length - 3} more`
  return names.length < 2 ? names.join('') : `${names.slice(0, -1).join(', ')} and ${names.at(-1) ?? ''}`
}

const percent = (share: number) => `${Math.round(share * 100)} %`
const minutesText = (minutes: number) => (minutes <= 1 ? 'a minute' : `${minutes} min`)

/** Why a test comes next, for the technician. */
export function reasonFor(
  test: { parts: readonly string[]; minutes: number; waitMinutes: number },
  likelyIn: number,
  suspectsIn: readonly string[],
  suspectsOut: readonly string[],
  parts: readonly IsolationPart[],
): string {
  return (
    `Says most for its ${minutesText(test.minutes)}: ${percent(likelyIn)} of what is likely is in it. ` +
    `If it leaks: ${nameParts(suspectsIn, parts)}. If it holds: ${nameParts(suspectsOut, parts)}.`
  )
}

export const WHOLE_FIRST =
  'Read the whole boat first: all else is measured against it, and the logger does it free.'
export const WHOLE_LONGER =
  'Nothing is seen to leak yet: wait longer on the whole boat before anything comes off.'
export const SECOND_LEAK = 'One leak does not explain the tests; this parts what is not accounted for. '
