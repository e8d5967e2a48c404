'use client'

import { useState } from 'react'
import { useApi } from '@/components/data/use-api'
import { NewBoatForm } from '@/components/register/new-boat-form'
import { useWork, type Acts } from '@/components/register/use-commissioning'
import { Button } from '@/components/ui/button'
import { Field } from '@/components/ui/field'
import { Loading, Trouble } from '@/components/ui/sheet-states'
import type { Commissioning, FleetRow, List } from '@/shared/schemas'

const SHOWN = 12

/** The boat and the system on it that the logger belongs to: picked from those one sees, or made. */
export function BoatStep({
  commissioning,
  acts,
  onward,
}: {
  commissioning: Commissioning
  acts: Acts
  onward: () => void
}) {
  const { data, error, mutate } = useApi<List<FleetRow>>('/api/vessels?limit=5000')
  const [find, setFind] = useState('')
  const [making, setMaking] = useState(false)
  const { busy, trouble, attempt } = useWork()
  const choose = async (systemId: string) => {
    if (await attempt(() => acts.change({ systemId }))) onward()
  }
  const chosen = commissioning.system
  const wanted = find.trim().toLowerCase()
  const rows = (data?.items ?? []).filter((row) =>
    [row.name, row.systemName, row.berth, row.harbour].some((text) => text?.toLowerCase().includes(wanted)),
  )
  if (commissioning.fittedAt !== null && chosen)
    return (
      <p>
        Fitted to {[chosen.vesselName, chosen.name].filter(Boolean).join(', ')}. To put it on another boat,
        move it from the logger’s own page: this boat keeps its past.
      </p>
    )
  return (
    <div className="grid gap-6">
      {chosen ? (
        <div>
          <p className="text-lead">
            Chosen: <strong>{[chosen.vesselName, chosen.name].filter(Boolean).join(', ')}</strong>
          </p>
          <Button className="mt-3" onClick={onward}>
            Go on with this boat
          </Button>
        </div>
      ) : null}
      {trouble ? <Trouble title={trouble} /> : null}
      {making ? (
        <NewBoatForm made={choose} cancel={() => setMaking(false)} />
      ) : (
        <div className="grid gap-4">
          <div className="flex flex-wrap items-end gap-4">
            <div className="min-w-0 flex-1 basis-60">
              <Field
                label={chosen ? 'Or find another' : 'Find the boat'}
                type="search"
                value={find}
                onChange={(event) => setFind(event.target.value)}
                autoComplete="off"
              />
            </div>
            <Button weight="quiet" onClick={() => setMaking(true)}>
              Set up a new boat
            </Button>
          </div>
          {error && !data ? <Trouble title={error.message} retry={() => void mutate()} /> : null}
          {!data && !error ? <Loading what="the boats" /> : null}
          {data && rows.length === 0 ? (
            <p className="text-ink-2">
              No boat by that name may be seen. Set it up new, or ask its owner to let the shop in.
            </p>
          ) : null}
          <ul>
            {rows.slice(0, SHOWN).map((row) => (
              <li key={row.systemId} className="border-b border-line">
                <button
                  type="button"
                  disabled={busy}
                  onClick={() => void choose(row.systemId)}
                  className="flex min-h-14 w-full flex-wrap items-baseline justify-between gap-x-4 py-2 text-left hover:bg-shallow"
                >
                  <span className="font-bold">{[row.name, row.systemName].filter(Boolean).join(', ')}</span>
                  <span className="datum">
                    {[row.berth, row.harbour].filter(Boolean).join(', ')}
                    {row.lastHeardAt ? '; has a logger: this one takes its place' : ''}
                  </span>
                </button>
              </li>
            ))}
          </ul>
          {rows.length > SHOWN ? (
            <p className="datum">{rows.length - SHOWN} more; type some of the name.</p>
          ) : null}
        </div>
      )}
    </div>
  )
}
