'use client'

import { useCallback, useMemo, useState } from 'react'
import type { StepMark, VisitMark } from '@/components/charts/annotations'
import { ScatterPlot } from '@/components/charts/scatter-plot'
import { withQuery } from '@/components/data/request'
import { useNow } from '@/components/data/use-now'
import { useWholeList } from '@/components/data/use-whole-list'
import { Loading, Trouble } from '@/components/ui/sheet-states'
import { holdAxis, holdPoints, holdsFinding, holdTickLabel } from '@/components/vessel/record/hold-points'
import { HoldsTable } from '@/components/vessel/record/holds-table'
import type { Hold, System, Vessel } from '@/shared/schemas'

const DAY_MS = 86_400_000
const STRETCHES = [14, 60, 365] as const

/** Every hold on a logarithmic axis, against limit and aim. */
export function HoldsSection({
  vessel,
  system,
  steps,
  visits,
}: {
  vessel: Vessel
  system: System
  steps: readonly StepMark[]
  visits: readonly VisitMark[]
}) {
  const now = useNow(15 * 60_000)
  const [days, setDays] = useState<number>(60)
  const range = useMemo(() => ({ fromMs: now - days * DAY_MS, toMs: now }), [now, days])
  const from = new Date(Math.floor(range.fromMs / DAY_MS) * DAY_MS).toISOString()
  const {
    data: holds,
    error,
    mutate,
  } = useWholeList<Hold>(withQuery(`/api/systems/${system.id}/holds`, { from, limit: 5000 }))
  const { limitSeconds, aimSeconds } = system.settings
  const points = useMemo(
    () => holdPoints(holds ?? [], { limitSeconds, aimSeconds }),
    [holds, limitSeconds, aimSeconds],
  )
  const axis = useMemo(
    () => holdAxis(points, { limitSeconds, aimSeconds }),
    [points, limitSeconds, aimSeconds],
  )
  const lines = useMemo(
    () => [{ value: limitSeconds, dotted: true }, { value: aimSeconds }],
    [limitSeconds, aimSeconds],
  )
  const tickLabel = useCallback(
    (seconds: number) => holdTickLabel(seconds, { limitSeconds, aimSeconds }),
    [limitSeconds, aimSeconds],
  )
  const offsets = useMemo(() => [{ from: 0, seconds: vessel.utcOffsetSeconds }], [vessel.utcOffsetSeconds])
  return (
    <section aria-labelledby="holds-title">
      <div className="mt-9 mb-2 flex flex-wrap items-end justify-between gap-3">
        <h2 id="holds-title">Holds</h2>
        <label className="no-print datum flex items-center gap-2">
          last
          <select
            className="min-h-11 rounded-sm border border-field bg-water px-2 text-body text-ink sm:min-h-9"
            value={days}
            onChange={(event) => setDays(Number(event.target.value))}
          >
            {STRETCHES.map((stretch) => (
              <option key={stretch} value={stretch}>
                {stretch} days
              </option>
            ))}
          </select>
        </label>
      </div>
      {error ? <Trouble title={error.message} retry={() => void mutate()} /> : null}
      {!holds && !error ? <Loading what="the holds" /> : null}
      {holds ? (
        <>
          <p className="mb-2 text-ink-2">{holdsFinding(holds, days, { limitSeconds, aimSeconds })}</p>
          <figure aria-label="Holds over time on a logarithmic axis; the table beneath has the same figures.">
            <ScatterPlot
              points={points}
              range={range}
              {...axis}
              logarithmic
              axisPx={78}
              tickLabel={tickLabel}
              lines={lines}
              steps={steps}
              visits={visits}
              offsets={offsets}
            />
          </figure>
          <p className="datum">
            Filled disc: the pump ran by itself. Hollow triangle: a flush cut the hold short; it would have
            held at least that long.
          </p>
          <HoldsTable holds={holds} offsets={offsets} nowMs={now} />
        </>
      ) : null}
    </section>
  )
}
