'use client'

import { useMemo } from 'react'
import { useApi } from '@/components/data/use-api'
import { useNow } from '@/components/data/use-now'
import { FleetFilters } from '@/components/fleet/fleet-filters'
import { FleetTable } from '@/components/fleet/fleet-table'
import { OutlookScoreLine } from '@/components/fleet/outlook-score-line'
import { fleetFinding } from '@/components/fleet/finding'
import { sortRows } from '@/components/fleet/order'
import { useFleetView } from '@/components/fleet/use-fleet-view'
import { countStates, filterRows, harboursOf } from '@/components/fleet/view-state'
import { clock, dayOf } from '@/components/time'
import { Button } from '@/components/ui/button'
import { Empty, Loading, Trouble } from '@/components/ui/sheet-states'
import { TitleBlock } from '@/components/ui/title-block'
import type { FleetRow, List } from '@/shared/schemas'

const DATUM =
  'Hold time: how long without a flush before the pump runs. Dotted: the limit. Full line: the aim.'
const NONE: FleetRow[] = []

/** Every boat the shop may see, on one scale, worst first. */
export function FleetSheet() {
  const now = useNow()
  const [view, change] = useFleetView()
  const { data, error, mutate } = useApi<List<FleetRow>>('/api/vessels?limit=5000', { refreshMs: 60_000 })
  const rows = data?.items ?? NONE
  const counts = useMemo(() => countStates(rows), [rows])
  const harbours = useMemo(() => harboursOf(rows), [rows])
  const shown = useMemo(() => sortRows(filterRows(rows, view), view.sort), [rows, view])
  const first = rows[0]
  const unheard = counts.find((entry) => entry.state === 'unheard')?.count ?? 0
  const aside = first
    ? [
        `${rows.length - unheard} heard, ${unheard} unheard`,
        `${dayOf(now, first.utcOffsetSeconds)}, ${clock(now, first.utcOffsetSeconds)}${
          harbours.length === 1 ? `, ${harbours[0]}` : ''
        }`,
      ]
    : []
  return (
    <>
      <TitleBlock title="Fleet" datum={DATUM} aside={aside} />
      <div className="sheet">
        {error && !data ? <Trouble title={error.message} retry={() => void mutate()} /> : null}
        {!data && !error ? <Loading what="the fleet" /> : null}
        {data && rows.length === 0 ? (
          <Empty title="No boat is connected yet">
            A boat appears here once its owner lets the shop see it, or once a logger is fitted to it.
          </Empty>
        ) : null}
        {rows.length > 0 ? (
          <>
            <p className="mb-4 max-w-[44em] text-finding tracking-[-0.015em]">{fleetFinding(rows)}</p>
            <OutlookScoreLine />
            <FleetFilters view={view} change={change} counts={counts} harbours={harbours} />
            {shown.length > 0 ? (
              <FleetTable rows={shown} nowMs={now} />
            ) : (
              <Empty title="No boat answers to that">
                <Button weight="plain" onClick={() => change({ find: '', states: [], harbour: '' })}>
                  Show all {rows.length}
                </Button>
              </Empty>
            )}
          </>
        ) : null}
      </div>
    </>
  )
}
