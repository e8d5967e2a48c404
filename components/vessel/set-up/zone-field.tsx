'use client'

import { useId, useState, type KeyboardEvent } from 'react'
import { useApi } from '@/components/data/use-api'
import { withQuery } from '@/components/data/request'
import type { KnownZone, List } from '@/shared/schemas'

const two = (value: number): string => String(value).padStart(2, '0')
/** `utcWords(-12600) // "UTC−03:30"` */
export function utcWords(seconds: number): string {
  const minutes = Math.round(Math.abs(seconds) / 60)
  return `UTC${seconds < 0 ? '−' : '+'}${two(Math.floor(minutes / 60))}:${two(minutes % 60)}`
}

/** A time zone picked from a list that is searched while one types; names and offsets are the server's. */
export function ZoneField({
  label,
  value,
  error,
  pick,
}: {
  label: string
  value: string
  error?: string | undefined
  pick: (name: string) => void
}) {
  const id = useId()
  const [isOpen, setOpen] = useState(false)
  const [active, setActive] = useState(0)
  const { data } = useApi<List<KnownZone>>(
    isOpen ? withQuery('/api/time-zones', { search: value.trim(), limit: 40 }) : null,
    {
      keepPrevious: true,
    },
  )
  const zones = data?.items ?? []
  const choose = (name: string) => {
    pick(name)
    setOpen(false)
  }
  const step = (by: number) => {
    setOpen(true)
    const next = zones.length === 0 ? 0 : (active + by + zones.length) % zones.length
    setActive(next)
    document.getElementById(`${id}-${next}`)?.scrollIntoView({ block: 'nearest' })
  }
  const onKeyDown = (event: KeyboardEvent) => {
    if (event.key === 'ArrowDown' || event.key === 'ArrowUp') {
      event.preventDefault()
      step(event.key === 'ArrowDown' ? (isOpen ? 1 : 0) : -1)
    }
    if (event.key === 'Escape') setOpen(false)
    const zone = zones[active]
    if (event.key === 'Enter' && isOpen && zone) {
      event.preventDefault()
      choose(zone.name)
    }
  }
  return (
    <div className="grid content-start gap-1.5">
      <label htmlFor={id} className="font-semibold">
        {label}
      </label>
      <span id={`${id}-hint`} className="datum">
        type a place and pick it from the list
      </span>
      <input
        id={id}
        role="combobox"
        aria-expanded={isOpen}
        aria-controls={`${id}-list`}
        aria-autocomplete="list"
        aria-activedescendant={isOpen && zones.length > 0 ? `${id}-${active}` : undefined}
        aria-invalid={error ? true : undefined}
        aria-describedby={error ? `${id}-hint ${id}-error` : `${id}-hint`}
        autoComplete="off"
        spellCheck={false}
        className="min-h-11 w-full rounded-sm border border-field bg-water px-3 py-2 aria-invalid:border-attention"
        value={value}
        onChange={(event) => {
          pick(event.target.value)
          setActive(0)
          setOpen(true)
        }}
        onClick={() => setOpen(true)}
        onBlur={() => setOpen(false)}
        onKeyDown={onKeyDown}
      />
      <ul
        id={`${id}-list`}
        role="listbox"
        aria-label={label}
        hidden={!isOpen}
        className="max-h-60 overflow-y-auto border border-line"
      >
        {zones.map((zone, index) => (
          <li
            key={zone.name}
            id={`${id}-${index}`}
            role="option"
            aria-selected={index === active}
            className="flex min-h-11 cursor-pointer flex-wrap items-center justify-between gap-x-4 px-3 aria-selected:bg-shallow"
            // Before the field loses the focus, which would close the list under the pointer.
            onPointerDown={(event) => event.preventDefault()}
            onClick={() => choose(zone.name)}
          >
            <span className="break-all">{zone.name.replaceAll('_', ' ')}</span>
            <span className="datum tabular-nums">{utcWords(zone.utcOffsetSeconds)}</span>
          </li>
        ))}
      </ul>
      {isOpen && data && zones.length === 0 ? (
        <span className="datum">No zone has that in its name.</span>
      ) : null}
      {error ? (
        <span id={`${id}-error`} className="text-note text-attention">
          {error}
        </span>
      ) : null}
    </div>
  )
}
