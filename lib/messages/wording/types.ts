/** What there is to say of one event on one boat, before it becomes a mail or a text. */
export interface Wording {
  /** After the boat's name in a subject line: "the pump may run 4 times tonight". */
  subject: string
  /** The finding as a whole sentence. */
  finding: string
  /** How sure that is, and what it rests on. */
  sureness: string | null
  /** What to do, in the order of doing. */
  steps: string[]
  caution: string | null
  /** After the boat's name in a text message, longest first. */
  texts: string[]
  /** A few words, where several boats share one text. */
  short: string
  strip: { quiet: [number, number]; expected: number[] } | null
}
