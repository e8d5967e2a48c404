import { HoldAxis } from '@/components/charts/hold-scale'
import { FLEET_GRID } from '@/components/fleet/fleet-row'

const HEAD = 'text-note font-medium text-ink-2 pb-2'

/** The head of the table; on a phone only the axis of the hold scale is left of it. */
export function FleetHead() {
  return (
    <div role="rowgroup" className="sticky top-0 z-10 border-b-[1.5px] border-ink bg-water pt-2">
      <div role="row" aria-rowindex={1} className={`${FLEET_GRID} items-end`}>
        {['Vessel', 'State and hold time'].map((word) => (
          <div key={word} role="columnheader" className={`${HEAD} sr-only lg:not-sr-only`}>
            {word}
          </div>
        ))}
        <div role="columnheader" className={`${HEAD} col-span-2 lg:col-span-1`}>
          <span className="mb-1 block">Holds</span>
          <HoldAxis />
        </div>
        {['Moving', 'Tonight', 'Last seven nights', 'Heard', 'Open'].map((word) => (
          <div key={word} role="columnheader" className={`${HEAD} sr-only lg:not-sr-only`}>
            {word}
          </div>
        ))}
      </div>
    </div>
  )
}
