'use client'

import { usePathname, useSearchParams } from 'next/navigation'
import { useCallback, useMemo } from 'react'
import type { Span } from '@/components/charts/plot-options'
import { heldTo, parseRange, USUAL_MS } from '@/components/vessel/record/range'

const MINUTE_MS = 60_000

/**
 * The stretch shown, kept in the address so that a link shows the same. Without one it is the last two days and
 * follows the clock, minute by minute.
 */
export function useRange(nowMs: number): [Span, (range: Span | null) => void] {
  const query = useSearchParams()
  const path = usePathname()
  const asked = useMemo(() => parseRange(new URLSearchParams(query)), [query])
  const minute = Math.ceil(nowMs / MINUTE_MS) * MINUTE_MS
  const range = useMemo(() => asked ?? { fromMs: minute - USUAL_MS, toMs: minute }, [asked, minute])
  const setRange = useCallback(
    (next: Span | null) => {
      const held = next && heldTo(next, Date.now())
      const changed = new URLSearchParams(query)
      changed.delete('from')
      changed.delete('to')
      if (held) {
        changed.set('from', new Date(held.fromMs).toISOString())
        changed.set('to', new Date(held.toMs).toISOString())
      }
      window.history.replaceState(null, '', `${path}?${changed.toString()}`)
    },
    [path, query],
  )
  return [range, setRange]
}
