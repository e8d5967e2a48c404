/**
 * Where to go after signing in: a path of our own, or null. Addresses elsewhere are not followed, so that
 * a link to the sign-in page cannot lead a person off the site.
 * `safeNext('/vessels/7') // "/vessels/7"` · `safeNext('//elsewhere.example') // null`
 */
export function safeNext(wanted: string | string[] | undefined): string | null {
  if (typeof wanted !== 'string') return null
  try {
    // A parser decides, not a pattern: browsers read `/\elsewhere` as another host.
    const base = 'http://middlewatch.invalid'
    const url = new URL(wanted, base)
    // next-auth hands over a whole address of ours; only its path is kept.
    const whole = /^https?:\/\//.test(wanted)
    if (!whole && !wanted.startsWith('/')) return null
    const path = whole ? new URL(url.pathname + url.search, base) : url
    return path.origin === base && !path.pathname.startsWith('//') && path.pathname !== '/sign-in'
      ? `${path.pathname}${path.search}${path.hash}`
      : null
  } catch {
    return null
  }
}
