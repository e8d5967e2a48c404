/**
 * Where a request comes from: what the nearest proxy (or the web server itself) wrote last.
 * Earlier entries are whatever the sender liked to claim.
 */
export function addressOf(headers: Headers): string {
  const hops = (headers.get('x-forwarded-for') ?? '').split(',')
  return hops[hops.length - 1]?.trim() || 'unknown'
}
