'use client'

import { useMemo } from 'react'
import { useApi } from '@/components/data/use-api'
import { useNow } from '@/components/data/use-now'
import { finishedNights } from '@/components/nights'
import { isTroubled } from '@/components/states'
import { LastNights } from '@/components/tonight/last-nights'
import { Empty } from '@/components/ui/sheet-states'
import { CompareSection } from '@/components/vessel/record/compare-section'
import { HoldsSection } from '@/components/vessel/record/holds-section'
import { stepMarks, visitMarks } from '@/components/vessel/record/marks'
import { TraceSection } from '@/components/vessel/record/trace-section'
import { trendWords } from '@/components/vessel/record/trend-words'
import { useVessel } from '@/components/vessel/use-vessel'
import { useNights, useTrend } from '@/components/vessel/use-figures'
import { VesselHeadline } from '@/components/vessel/vessel-headline'
import type { List, Visit } from '@/shared/schemas'

/** The whole record: the trace, every hold, and the nights, with steps and visits in their places. */
export function RecordTab({ id }: { id: string }) {
  const now = useNow(60_000)
  const { vessel, system } = useVessel(id)
  const trend = useTrend(system?.id, now).data
  const visits = useApi<List<Visit>>(vessel ? `/api/visits?vessel=${vessel.id}` : null).data
  const nights = useNights(system?.id, 15).data
  const offset = vessel?.utcOffsetSeconds ?? 0
  const steps = useMemo(
    () => stepMarks(trend?.steps ?? [], [{ from: 0, seconds: offset }], now),
    [trend, offset, now],
  )
  const came = useMemo(() => visitMarks(visits?.items ?? [], system?.id ?? ''), [visits, system?.id])
  if (!vessel || !system) return null
  const heard = nights?.items.find((item) => item.systemId === system.id)?.nights ?? []
  const listed = finishedNights(heard, vessel.utcOffsetSeconds, now, 14)
  return (
    <>
      <div className="mt-5 grid gap-x-12 gap-y-6 xl:grid-cols-[minmax(0,1fr)_27rem]">
        <VesselHeadline vessel={vessel} system={system} />
        {listed.length > 0 ? (
          <div>
            <h2 className="datum mb-1 font-medium">Last nights</h2>
            <LastNights
              nights={listed.slice(-3)}
              calm={!isTroubled(system.state)}
              lastHeardAt={system.logger?.lastHeardAt ?? null}
              offsetSeconds={vessel.utcOffsetSeconds}
            />
          </div>
        ) : null}
      </div>
      {vessel.rights.fullRecord ? (
        <TraceSection vessel={vessel} system={system} steps={steps} visits={came} />
      ) : (
        <Empty title="The trace is the owner’s to share">
          Leak figures, holds and runs are shared; vacuum, flushes and presence need the owner’s second
          consent or an open visit.
        </Empty>
      )}
      {trend ? (
        <section className="mt-9" aria-labelledby="trend-title">
          <h2 id="trend-title" className="mb-2">
            Trend
          </h2>
          <p className="max-w-[46em]">
            {trendWords(trend, system.settings.limitSeconds, vessel.utcOffsetSeconds, now)}
          </p>
        </section>
      ) : null}
      <HoldsSection vessel={vessel} system={system} steps={steps} visits={came} />
      <CompareSection vessel={vessel} system={system} visits={visits?.items ?? []} />
      {listed.length > 0 ? (
        <section className="mt-9 max-w-[60rem]" aria-labelledby="nights-title">
          <h2 id="nights-title" className="mb-2">
            Nights
          </h2>
          <LastNights
            nights={listed}
            calm={!isTroubled(system.state)}
            lastHeardAt={system.logger?.lastHeardAt ?? null}
            offsetSeconds={vessel.utcOffsetSeconds}
          />
        </section>
      ) : null}
    </>
  )
}
