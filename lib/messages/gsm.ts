/** Letters of one septet in the basic alphabet of text messages (3GPP TS 23.038, table 6.2.1), value from memory. */
const BASIC =
  '@£$¥èéùìòÇ\nØø\rÅåΔ_ΦΓΛΩΠΨΣΘΞÆæßÉ !"#¤%&\'()*+,-./0123456789:;<=>?¡ABCDEFGHIJKLMNOPQRSTUVWXYZÄÖÑÜ§¿abcdefghijklmnopqrstuvwxyzäöñüà'
/** Letters of two septets (table 6.2.1.1), value from memory. */
const EXTENDED = '^{}\\[~]|€'
const PLAIN: Record<string, string> = {
  '’': "'",
  '‘': "'",
  '“': '"',
  '”': '"',
  '–': '-',
  '—': '-',
  '…': '...',
  '×': 'x',
  '·': '.',
}

export const TEXT_LIMIT = 160

/**
 * The same text in the alphabet of text messages: accents it does not know are dropped, other letters become `?`.
 * One letter outside it would halve the length of the whole message.
 * @example toGsm("Renée’s Îlot") // "Renée's Ilot"
 */
export function toGsm(text: string): string {
  return [...text.normalize('NFC')]
    .map((letter) => {
      if (isGsm(letter)) return letter
      const plain = PLAIN[letter] ?? letter.normalize('NFD').replace(/\p{M}/gu, '')
      return [...plain].every(isGsm) ? plain : '?'
    })
    .join('')
}

/** Septets that a text takes; letters outside the alphabet count as one. */
export const gsmLength = (text: string): number =>
  [...text].reduce((sum, letter) => sum + (EXTENDED.includes(letter) ? 2 : 1), 0)

const isGsm = (letter: string): boolean => BASIC.includes(letter) || EXTENDED.includes(letter)

/** Cuts a text to so many septets, with two full stops where something is missing. */
export function shorten(text: string, limit: number): string {
  if (gsmLength(text) <= limit) return text
  let kept = ''
  for (const letter of text) {
    if (gsmLength(kept + letter) > limit - 2) break
    kept += letter
  }
  return `${kept.trimEnd()}..`
}

/** The first of several wordings, longest first, that fits into one text message; the last is cut if it must. */
export function firstThatFits(wordings: string[]): string {
  const plain = wordings.map(toGsm)
  return plain.find((text) => gsmLength(text) <= TEXT_LIMIT) ?? shorten(plain.at(-1) ?? '', TEXT_LIMIT)
}
