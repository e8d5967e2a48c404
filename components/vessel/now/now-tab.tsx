'use client'

import { useNow } from '@/components/data/use-now'
import { useUnits } from '@/components/shell/units-context'
import { finishedNights } from '@/components/nights'
import { isTroubled } from '@/components/states'
import { LastNights } from '@/components/tonight/last-nights'
import { BeforeYouGo } from '@/components/vessel/before-you-go/before-you-go'
import { useVessel } from '@/components/vessel/use-vessel'
import { useNights, useOutlook, useSummary } from '@/components/vessel/use-figures'
import { nowFigures } from '@/components/vessel/now/figures'
import { VacuumBand } from '@/components/vessel/now/vacuum-band'
import { VesselHeadline } from '@/components/vessel/vessel-headline'

/** The system at this moment: where the vacuum stands, how long it has held, and the nights just past. */
export function NowTab({ id }: { id: string }) {
  const now = useNow(10_000)
  const { units } = useUnits()
  const { vessel, system } = useVessel(id)
  const summary = useSummary(system?.id).data
  const outlook = useOutlook(system?.id).data ?? null
  const nights = useNights(system?.id, 8).data
  if (!vessel || !system) return null
  const heard = nights?.items.find((item) => item.systemId === system.id)?.nights ?? []
  const listed = finishedNights(heard, vessel.utcOffsetSeconds, now)
  const offsets = [{ from: 0, seconds: vessel.utcOffsetSeconds }]
  return (
    <div className="mt-5 grid gap-x-16 gap-y-6 xl:grid-cols-[minmax(0,1fr)_minmax(0,34rem)]">
      <div>
        <VesselHeadline vessel={vessel} system={system} />
        {system.settings.kind === 'on-demand' ? (
          <p className="mt-2 max-w-[46em] text-ink-2">
            This system keeps no standing vacuum: hold time does not apply, and only the pump is watched.
          </p>
        ) : null}
        {summary ? (
          <>
            <h2 className="mt-7 mb-2">At this moment</h2>
            <VacuumBand summary={summary} unit={units.vacuum} />
            <table className="ruled max-w-[38em]">
              <tbody>
                {nowFigures(summary, outlook, system, units.vacuum, offsets, now).map((line) => (
                  <tr key={line.name}>
                    <th scope="row" className="w-[40%]">
                      {line.name}
                    </th>
                    <td className="figure whitespace-nowrap">{line.value}</td>
                    <td className="datum">{line.note}</td>
                  </tr>
                ))}
              </tbody>
            </table>
          </>
        ) : null}
      </div>
      <div>
        <h2 className="mb-2">Last seven nights</h2>
        {listed.length > 0 ? (
          <LastNights
            nights={listed}
            calm={!isTroubled(system.state)}
            lastHeardAt={system.logger?.lastHeardAt ?? null}
            offsetSeconds={vessel.utcOffsetSeconds}
          />
        ) : (
          <p className="text-ink-2">No night has been heard yet.</p>
        )}
        <BeforeYouGo vessel={vessel} system={system} />
      </div>
    </div>
  )
}
