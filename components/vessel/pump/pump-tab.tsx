'use client'

import { useMemo } from 'react'
import { ScatterPlot } from '@/components/charts/scatter-plot'
import { linearTicks } from '@/components/charts/scales'
import { withQuery } from '@/components/data/request'
import { useNow } from '@/components/data/use-now'
import { useWholeList } from '@/components/data/use-whole-list'
import { useUnits } from '@/components/shell/units-context'
import { Empty, Loading, Trouble } from '@/components/ui/sheet-states'
import { pumpFinding } from '@/components/vessel/pump/finding'
import { pumpDays, rechargePoints } from '@/components/vessel/pump/pump-days'
import { PumpDaysTable } from '@/components/vessel/pump/pump-days-table'
import { supplyBins } from '@/components/vessel/pump/supply-bins'
import { SupplyTable } from '@/components/vessel/pump/supply-table'
import { useSummary } from '@/components/vessel/use-figures'
import { useVessel } from '@/components/vessel/use-vessel'
import type { Run } from '@/shared/schemas'
import { fromPa } from '@/shared/units'

const DAY_MS = 86_400_000
const DAYS = 30

/** The pump by itself: how fast it draws down, how often and how long it runs, and what that takes from the battery. */
export function PumpTab({ id }: { id: string }) {
  const now = useNow(15 * 60_000)
  const { units } = useUnits()
  const { vessel, system } = useVessel(id)
  const summary = useSummary(system?.id).data
  const range = useMemo(() => ({ fromMs: now - DAYS * DAY_MS, toMs: now }), [now])
  const from = new Date(Math.floor(range.fromMs / DAY_MS) * DAY_MS).toISOString()
  const { data, error, mutate } = useWholeList<Run>(
    system ? withQuery(`/api/systems/${system.id}/runs`, { from, limit: 5000 }) : null,
  )
  const points = useMemo(
    () => rechargePoints(data ?? []).map((point) => ({ ...point, value: fromPa(point.value, units.vacuum) })),
    [data, units.vacuum],
  )
  const days = useMemo(
    () => pumpDays(data ?? [], vessel?.utcOffsetSeconds ?? 0, system?.settings.pumpAmps ?? null),
    [data, vessel?.utcOffsetSeconds, system?.settings.pumpAmps],
  )
  const bins = useMemo(() => supplyBins(data ?? []), [data])
  const high = points.reduce((most, point) => Math.max(most, point.value), 0) * 1.15 || 1
  const ticks = useMemo(() => linearTicks(0, high, 5), [high])
  if (!vessel || !system) return null
  if (error) return <Trouble title={error.message} retry={() => void mutate()} />
  if (!data) return <Loading what="the runs" />
  if (data.length === 0) return <Empty title={`The pump has not run in the last ${DAYS} days`} />
  const usual = summary?.recharge?.usualPaPerSecond ?? null
  return (
    <>
      <p className="mt-5 max-w-[40em] text-finding tracking-[-0.015em]">
        {pumpFinding(summary ?? null, days, units.vacuum)}
      </p>
      <h2 className="mt-7 mb-2">Recharge, {units.vacuum} a second</h2>
      {points.length > 0 ? (
        <figure aria-label="How fast each run by itself raised the vacuum, over thirty days.">
          <ScatterPlot
            points={points}
            range={range}
            low={0}
            high={high}
            logarithmic={false}
            ticks={ticks}
            tickLabel={String}
            lines={usual === null ? [] : [{ value: fromPa(usual, units.vacuum) }]}
            steps={[]}
            visits={[]}
            offsets={[{ from: 0, seconds: vessel.utcOffsetSeconds }]}
            height={220}
          />
        </figure>
      ) : (
        <p className="text-ink-2">No run by itself in {DAYS} days with the vacuum measured at both ends.</p>
      )}
      <p className="datum">
        Only runs by themselves: they refill the same differential each time, so a change is the pump’s. The
        line is the usual recharge.
      </p>
      <SupplyTable bins={bins} unit={units.vacuum} />
      <h2 className="mt-8 mb-2">Day by day</h2>
      <PumpDaysTable days={days} />
    </>
  )
}
