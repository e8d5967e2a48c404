'use client'

import { useEffect } from 'react'

/** Asks the service worker to keep this page and what it is made of, so that it opens in a bilge without a signal. */
export function useKeepOffline(): void {
  useEffect(() => {
    if (!('serviceWorker' in navigator)) return
    const keep = async () => {
      await navigator.serviceWorker.register('/sw.js')
      const { active } = await navigator.serviceWorker.ready
      const parts = performance
        .getEntriesByType('resource')
        .map((entry) => new URL(entry.name))
        .filter((url) => url.origin === location.origin && url.pathname.startsWith('/_next/static/'))
        .map((url) => url.pathname + url.search)
      active?.postMessage({ keep: location.pathname, parts: [...new Set(parts)] })
    }
    // Without it the page still works while there is a signal.
    keep().catch(() => undefined)
  }, [])
}
