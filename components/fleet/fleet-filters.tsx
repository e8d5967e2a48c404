'use client'

import { useEffect, useRef } from 'react'
import { SORT_WORDS, SORTS } from '@/components/fleet/order'
import type { FleetView } from '@/components/fleet/view-state'
import { STATE_MEANINGS, STATE_WORDS, type SystemState } from '@/components/states'
import { StateMark } from '@/components/ui/state-mark'

const CHIP =
  'inline-flex min-h-11 items-center gap-2 whitespace-nowrap rounded-sm border border-field px-2.5 lg:min-h-9 aria-pressed:border-ink aria-pressed:font-semibold aria-pressed:inset-shadow-[0_-2px_0_var(--ink)]'
const SELECT = 'min-h-11 rounded-sm border border-field bg-water px-2 lg:min-h-9'

function isTyping(target: EventTarget | null): boolean {
  return target instanceof HTMLElement && target.matches('input, textarea, select, [contenteditable]')
}

/** States to show, harbour, order, and a search that the "/" key reaches from anywhere. */
export function FleetFilters({
  view,
  change,
  counts,
  harbours,
}: {
  view: FleetView
  change: (part: Partial<FleetView>) => void
  counts: readonly { state: SystemState; count: number }[]
  harbours: readonly string[]
}) {
  const search = useRef<HTMLInputElement>(null)
  useEffect(() => {
    const onKey = (event: KeyboardEvent) => {
      if (event.key !== '/' || event.ctrlKey || event.metaKey || event.altKey || isTyping(event.target))
        return
      event.preventDefault()
      search.current?.focus()
    }
    window.addEventListener('keydown', onKey)
    return () => window.removeEventListener('keydown', onKey)
  }, [])
  const toggle = (state: SystemState) =>
    change({
      states: view.states.includes(state)
        ? view.states.filter((other) => other !== state)
        : [...view.states, state],
    })
  return (
    <div className="no-print mb-4 flex flex-wrap items-center gap-2">
      <div className="-mx-5 flex max-w-[100vw] gap-2 overflow-x-auto px-5 sm:mx-0 sm:flex-wrap sm:px-0">
        {counts.map(({ state, count }) => (
          <button
            key={state}
            type="button"
            className={CHIP}
            aria-pressed={view.states.includes(state)}
            title={STATE_MEANINGS[state]}
            onClick={() => toggle(state)}
          >
            <StateMark state={state} />
            {STATE_WORDS[state]} <span className="figure">{count}</span>
          </button>
        ))}
      </div>
      <div className="flex w-full flex-wrap gap-2 lg:ml-auto lg:w-auto lg:flex-nowrap">
        {harbours.length > 1 ? (
          <select
            aria-label="Harbour"
            className={SELECT}
            value={view.harbour}
            onChange={(event) => change({ harbour: event.target.value })}
          >
            <option value="">All harbours</option>
            {harbours.map((harbour) => (
              <option key={harbour}>{harbour}</option>
            ))}
          </select>
        ) : null}
        <select
          aria-label="Order"
          className={SELECT}
          value={view.sort}
          onChange={(event) => change({ sort: SORTS.find((sort) => sort === event.target.value) ?? 'worst' })}
        >
          {SORTS.map((sort) => (
            <option key={sort} value={sort}>
              {SORT_WORDS[sort]}
            </option>
          ))}
        </select>
        <input
          ref={search}
          type="search"
          aria-label="Find a boat or berth"
          aria-keyshortcuts="/"
          placeholder="Find a boat or berth  /"
          className="min-h-11 min-w-0 flex-1 basis-full rounded-sm border border-field bg-water px-2.5 placeholder:text-ink-2 sm:basis-60 lg:min-h-9 lg:w-60 lg:flex-none"
          value={view.find}
          onChange={(event) => change({ find: event.target.value })}
          onKeyDown={(event) => {
            if (event.key === 'Escape') change({ find: '' })
            if (event.key === 'ArrowDown') {
              event.preventDefault()
              document.querySelector<HTMLAnchorElement>('[data-fleet-link][tabindex="0"]')?.focus()
            }
          }}
        />
      </div>
    </div>
  )
}
