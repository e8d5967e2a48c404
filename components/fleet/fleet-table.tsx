'use client'

import { useWindowVirtualizer } from '@tanstack/react-virtual'
import { useEffect, useLayoutEffect, useRef, useState, type KeyboardEvent } from 'react'
import { FleetHead } from '@/components/fleet/fleet-head'
import { FleetRowCells } from '@/components/fleet/fleet-row'
import type { FleetRow } from '@/shared/schemas'
import { useNightsInView } from '@/components/fleet/use-nights-in-view'
import { usePrinting } from '@/components/fleet/use-printing'

const ROW_PX = 69
const moved = (key: string, at: number, last: number): number | null => {
  const goals: Record<string, number> = {
    ArrowDown: at + 1,
    ArrowUp: at - 1,
    PageDown: at + 10,
    PageUp: at - 10,
    Home: 0,
    End: last,
  }
  const goal = goals[key]
  return goal === undefined ? null : Math.min(last, Math.max(0, goal))
}

/** The rows, of which only those in view exist; arrow keys move from boat to boat, Enter opens one. */
export function FleetTable({ rows, nowMs }: { rows: readonly FleetRow[]; nowMs: number }) {
  const body = useRef<HTMLDivElement>(null)
  const [margin, setMargin] = useState(0)
  const [current, setCurrent] = useState(0)
  const wanted = useRef<number | null>(null)
  const printing = usePrinting()
  const virtualizer = useWindowVirtualizer({
    count: rows.length,
    estimateSize: () => ROW_PX,
    overscan: 6,
    scrollMargin: margin,
    getItemKey: (index) => rows[index]?.systemId ?? index,
  })
  useLayoutEffect(() => {
    const place = () => setMargin((body.current?.getBoundingClientRect().top ?? 0) + window.scrollY)
    place()
    window.addEventListener('resize', place)
    return () => window.removeEventListener('resize', place)
  }, [])
  const items = virtualizer.getVirtualItems()
  const nights = useNightsInView(rows, items[0]?.index ?? 0)
  const active = Math.min(current, Math.max(0, rows.length - 1))
  useEffect(() => {
    if (wanted.current === null) return
    const link = body.current?.querySelector<HTMLAnchorElement>(`[data-fleet-link="${wanted.current}"]`)
    if (!link) return
    wanted.current = null
    link.focus({ preventScroll: true })
  })
  const onKeyDown = (event: KeyboardEvent) => {
    if (event.altKey || event.ctrlKey || event.metaKey) return
    const goal = moved(event.key, active, rows.length - 1)
    if (goal === null) return
    event.preventDefault()
    wanted.current = goal
    setCurrent(goal)
    virtualizer.scrollToIndex(goal, { align: 'auto' })
  }
  const cells = (index: number) => {
    const row = rows[index]
    if (!row) return null
    return (
      <FleetRowCells
        row={row}
        index={index}
        nights={nights.get(row.systemId)}
        nowMs={nowMs}
        current={index === active}
      />
    )
  }
  return (
    <div role="table" aria-label="Fleet" aria-rowcount={rows.length + 1}>
      <FleetHead />
      <div
        ref={body}
        role="rowgroup"
        onKeyDown={onKeyDown}
        onFocus={(event) => {
          const index = event.target.getAttribute('data-fleet-link')
          if (index !== null) setCurrent(Number(index))
        }}
        className="relative"
        style={printing ? undefined : { height: virtualizer.getTotalSize() }}
      >
        {printing
          ? rows.map((row, index) => <div key={row.systemId}>{cells(index)}</div>)
          : items.map((item) => (
              <div
                key={item.key}
                role="presentation"
                ref={virtualizer.measureElement}
                data-index={item.index}
                className="absolute inset-x-0 top-0"
                style={{ transform: `translateY(${item.start - margin}px)` }}
              >
                {cells(item.index)}
              </div>
            ))}
      </div>
    </div>
  )
}
