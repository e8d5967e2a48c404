/** What one may answer to a text, or do by the link in a message. */
export const REPLY_WORDS = ['OK', 'VISIT', 'MUTE', 'OFF', 'LAIDUP', 'STOP', 'START', 'HELP'] as const
export type ReplyWord = (typeof REPLY_WORDS)[number]
export type ActWord = Exclude<ReplyWord, 'STOP' | 'START' | 'HELP'>

/** Other ways in which people say the same; the service itself takes the first group for STOP. */
const SAME_AS: Record<string, ReplyWord> = {
  STOPALL: 'STOP',
  UNSUBSCRIBE: 'STOP',
  CANCEL: 'STOP',
  END: 'STOP',
  QUIT: 'STOP',
  UNSTOP: 'START',
  INFO: 'HELP',
  OKAY: 'OK',
  YES: 'OK',
  'LAID UP': 'LAIDUP',
}

/**
 * The word that a text says, whatever its case, marks or politeness.
 * @returns null when it says none of them.
 * @example replyWord(' Visit please!') // 'VISIT'
 */
export function replyWord(body: string): ReplyWord | null {
  const text = body
    .toUpperCase()
    .replace(/[^A-Z ]+/g, ' ')
    .replace(/ +/g, ' ')
    .trim()
  const [first = ''] = text.split(' ')
  for (const said of [text, text.split(' ').slice(0, 2).join(' '), first]) {
    const word = REPLY_WORDS.find((known) => known === said) ?? SAME_AS[said]
    if (word !== undefined) return word
  }
  return null
}
