import { NextResponse, type NextRequest } from 'next/server'

/**
 * Headers that every page carries. Who may see what is decided where the page reads, never here.
 * Next finds the nonce in the request's copy of the policy and puts it on its scripts.
 */
export function proxy(request: NextRequest): NextResponse {
  const nonce = Buffer.from(crypto.randomUUID()).toString('base64')
  const policy = contentSecurityPolicy(nonce)
  const headers = new Headers(request.headers)
  headers.set('x-nonce', nonce)
  headers.set('content-security-policy', policy)
  // Where a layout that sends somebody to sign in brings them back to.
  headers.set('x-path', `${request.nextUrl.pathname}${request.nextUrl.search}`)
  const response = NextResponse.next({ request: { headers } })
  response.headers.set('content-security-policy', policy)
  response.headers.set('x-content-type-options', 'nosniff')
  response.headers.set('referrer-policy', 'same-origin')
  // The camera reads a logger's code; nothing else of the device is needed.
  response.headers.set('permissions-policy', 'camera=(self), microphone=(), geolocation=(), payment=()')
  response.headers.set('cross-origin-opener-policy', 'same-origin')
  if (process.env.APP_URL?.startsWith('https://') === true)
    response.headers.set('strict-transport-security', 'max-age=31536000; includeSubDomains')
  return response
}

function contentSecurityPolicy(nonce: string): string {
  const developing = process.env.NODE_ENV === 'development'
  return [
    "default-src 'self'",
    `script-src 'self' 'nonce-${nonce}' 'strict-dynamic'${developing ? " 'unsafe-eval'" : ''}`,
    developing ? "style-src 'self' 'unsafe-inline'" : `style-src 'self' 'nonce-${nonce}'`,
    "style-src-attr 'unsafe-inline'",
    "img-src 'self' blob: data:",
    "font-src 'self'",
    `connect-src 'self'${developing ? ' ws:' : ''}`,
    "worker-src 'self'",
    "manifest-src 'self'",
    "object-src 'none'",
    "base-uri 'none'",
    "form-action 'self'",
    "frame-ancestors 'none'",
  ].join('; ')
}

export const config = {
  // Not the API: a proxy that sees an upload cuts its body at 10 MB without a word, and handlers set their own headers.
  // Of names that end like a file's only those at the root: `/vessels/1.js` is a page, and carries a page's headers.
  matcher: ['/((?!api/|_next/static|_next/image|[^/]*\\.(?:svg|png|ico|woff2|webmanifest|js)$).*)'],
}
