'use client'

import { usePathname, useSearchParams } from 'next/navigation'
import { useCallback, useMemo } from 'react'
import { parseView, viewQuery, type FleetView } from '@/components/fleet/view-state'

/** The view as the address says it, and a way to change it that leaves the back button for pages. */
export function useFleetView(): [FleetView, (change: Partial<FleetView>) => void] {
  const query = useSearchParams()
  const path = usePathname()
  const view = useMemo(() => parseView(new URLSearchParams(query)), [query])
  const change = useCallback(
    (part: Partial<FleetView>) =>
      window.history.replaceState(null, '', path + viewQuery({ ...view, ...part })),
    [path, view],
  )
  return [view, change]
}
