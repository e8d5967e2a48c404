'use client'

import { usePathname, useSearchParams } from 'next/navigation'
import { useCallback, useState } from 'react'
import { parseView, viewQuery, type FleetView } from '@/components/fleet/view-state'

/**
 * The view, and a way to change it that leaves the back button for pages. It lives here while it is changed, since
 * the address follows a moment later and a search field that waits for it loses letters; it is read from the address
 * whenever that changes by itself.
 */
export function useFleetView(): [FleetView, (change: Partial<FleetView>) => void] {
  const address = useSearchParams().toString()
  const path = usePathname()
  const [view, setView] = useState(() => parseView(new URLSearchParams(address)))
  const [seen, setSeen] = useState({ address, own: [] as string[] })
  if (seen.address !== address) {
    const isOwn = seen.own.includes(address)
    setSeen({ address, own: isOwn ? seen.own.slice(seen.own.indexOf(address) + 1) : [] })
    if (!isOwn) setView(parseView(new URLSearchParams(address)))
  }
  const change = useCallback(
    (part: Partial<FleetView>) => {
      const next = { ...view, ...part }
      const query = viewQuery(next)
      setView(next)
      setSeen((before) => ({ ...before, own: [...before.own, query.slice(1)].slice(-50) }))
      window.history.replaceState(null, '', path + query)
    },
    [path, view],
  )
  return [view, change]
}
