/** A sentence as pieces, some of which carry the finding and are set strong. */
export type Phrase = { text: string; strong?: 'attention' | 'ink' }

/** The sentence without its dress: for titles, labels and tests. */
export const plain = (phrases: readonly Phrase[]): string => phrases.map((phrase) => phrase.text).join('')

/** `times(1) // "once"`, `times(3) // "3 times"` */
export function times(count: number): string {
  if (count === 1) return 'once'
  return count === 2 ? 'twice' : `${count} times`
}
