/** As loggers show it: eight consonants, `WDJB-MJHT`. */
const CODE = /^[B-DF-HJ-NP-TV-XZ]{4}-?[B-DF-HJ-NP-TV-XZ]{4}$/i

/**
 * The user code in what a camera read: the code itself, or an address that carries it.
 * `codeIn('https://watch.example/claim?code=WDJB-MJHT') // "WDJB-MJHT"`; null when there is none
 */
export function codeIn(text: string): string | null {
  const plain = text.trim()
  const written = URL.canParse(plain) ? (new URL(plain).searchParams.get('code') ?? '') : plain
  return CODE.test(written.replace(/\s/g, '')) ? written.replace(/\s/g, '').toUpperCase() : null
}
