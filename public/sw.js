/*
 * Keeps pages that were asked to be kept, and what they are made of, for when there is no signal. A page is
 * always asked of the server first; what is under /_next/static never changes under its name and is read from
 * the store. Everything else passes by untouched.
 */
const STORE = 'middlewatch-kept-1'
const PARTS = '/_next/static/'

self.addEventListener('install', () => self.skipWaiting())
self.addEventListener('activate', (event) => {
  event.waitUntil(
    (async () => {
      for (const name of await caches.keys()) if (name !== STORE) await caches.delete(name)
      await self.clients.claim()
    })(),
  )
})

self.addEventListener('message', (event) => {
  const { keep, parts } = event.data ?? {}
  if (typeof keep !== 'string' || !Array.isArray(parts)) return
  event.waitUntil(
    (async () => {
      const store = await caches.open(STORE)
      // Without the cookie: what is kept on a shared phone carries nobody's name.
      const page = await fetch(keep, { credentials: 'omit' })
      if (page.ok && !page.redirected) await store.put(keep, page)
      for (const part of parts) {
        if (await store.match(part)) continue
        const answer = await fetch(part)
        if (answer.ok) await store.put(part, answer)
      }
    })(),
  )
})

self.addEventListener('fetch', (event) => {
  const { request } = event
  const url = new URL(request.url)
  if (request.method !== 'GET' || url.origin !== self.location.origin) return
  if (url.pathname.startsWith(PARTS)) {
    event.respondWith(caches.match(request).then((kept) => kept ?? fetch(request)))
  } else if (request.mode === 'navigate') {
    event.respondWith(
      fetch(request).catch(async (error) => {
        const kept = await caches.match(url.pathname)
        if (kept) return kept
        throw error
      }),
    )
  }
})
