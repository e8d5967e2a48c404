'use client'

import { useSearchParams } from 'next/navigation'
import { useState } from 'react'
import { useNow } from '@/components/data/use-now'
import { dayAndClock } from '@/components/time'
import { Button } from '@/components/ui/button'
import { CompareResult } from '@/components/vessel/record/compare-result'
import { CompareSide } from '@/components/vessel/record/compare-side'
import {
  comparableVisits,
  comparisonPath,
  NOTHING,
  spanTrouble,
  wallOf,
  type Asked,
} from '@/components/vessel/record/compare-spans'
import { useRange } from '@/components/vessel/record/use-range'
import type { System, Vessel, Visit } from '@/shared/schemas'

const MOST_VISITS = 5

/** Before and after: about a visit by one press, or any two spans, typed or taken from the trace. */
export function CompareSection({
  vessel,
  system,
  visits,
}: {
  vessel: Vessel
  system: System
  visits: readonly Visit[]
}) {
  const now = useNow(60_000)
  const [range] = useRange(now)
  const linked = useSearchParams().get('visit')
  const [asked, setAsked] = useState<Asked>({ before: NOTHING, after: NOTHING, visitId: linked })
  const offset = vessel.utcOffsetSeconds
  const came = comparableVisits(visits, system.id).slice(0, MOST_VISITS)
  const path = comparisonPath(system.id, asked, offset)
  const side = (name: 'before' | 'after') => {
    const change = (span: Asked['before']) => setAsked((last) => ({ ...last, [name]: span, visitId: null }))
    const shown = { from: wallOf(range.fromMs, offset), to: wallOf(Math.min(range.toMs, now), offset) }
    return (
      <CompareSide
        title={name === 'before' ? 'Before' : 'After'}
        span={asked[name]}
        trouble={spanTrouble(asked[name], offset)}
        change={change}
        takeShown={vessel.rights.fullRecord ? () => change(shown) : null}
      />
    )
  }
  return (
    <section aria-labelledby="compare-title" className="mt-9">
      <h2 id="compare-title" className="mb-2">
        Before and after
      </h2>
      {came.length > 0 ? (
        <div className="no-print mb-4 flex flex-wrap gap-2" role="group" aria-label="About a visit">
          {came.map((visit) => (
            <Button
              key={visit.id}
              weight="quiet"
              aria-pressed={asked.visitId === visit.id}
              className="aria-pressed:bg-shallow"
              onClick={() => setAsked({ before: NOTHING, after: NOTHING, visitId: visit.id })}
            >
              About the visit of {dayAndClock(visit.startedAt ?? visit.askedAt, offset, now)}
            </Button>
          ))}
        </div>
      ) : null}
      <div className="no-print grid max-w-[60em] gap-x-10 gap-y-4 lg:grid-cols-2">
        {side('before')}
        {side('after')}
      </div>
      <p className="datum no-print mt-2">Times by the boat’s clock as it stands today.</p>
      {path ? <CompareResult key={path} path={path} isVisit={asked.visitId !== null} /> : null}
    </section>
  )
}
