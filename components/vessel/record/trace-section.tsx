'use client'

import { useCallback, useEffect, useMemo, useRef, type KeyboardEvent } from 'react'
import type { StepMark, VisitMark } from '@/components/charts/annotations'
import { withQuery } from '@/components/data/request'
import { useApi } from '@/components/data/use-api'
import { useNow } from '@/components/data/use-now'
import { useUnits } from '@/components/shell/units-context'
import { isTroubled } from '@/components/states'
import { Loading, Trouble } from '@/components/ui/sheet-states'
import { byKey, zoomed } from '@/components/vessel/record/range'
import { RangeControls } from '@/components/vessel/record/range-controls'
import { RunsTable } from '@/components/vessel/record/runs-table'
import { traceData, traceFinding } from '@/components/vessel/record/trace-data'
import { TracePlot, type TraceMarks } from '@/components/vessel/record/trace-plot'
import { useRange } from '@/components/vessel/record/use-range'
import type { System, Trace, Vessel } from '@/shared/schemas'

/** The vacuum as it was, from a year down to a second; zooming asks again at the resolution that fits. */
export function TraceSection({
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
  const now = useNow(60_000)
  const { units } = useUnits()
  const [range, setRange] = useRange(now)
  const figure = useRef<HTMLElement>(null)
  const output = useRef<HTMLParagraphElement>(null)
  const path = withQuery(`/api/systems/${system.id}/trace`, {
    from: new Date(range.fromMs).toISOString(),
    to: new Date(range.toMs).toISOString(),
    points: 1600,
  })
  const { data: trace, error, mutate } = useApi<Trace>(path, { keepPrevious: true })
  const data = useMemo(() => traceData(trace, units.vacuum), [trace, units.vacuum])
  const marks = useMemo(
    (): TraceMarks => ({
      runs: (trace?.runs ?? []).map((run) => ({ atMs: run.startedAt, byItself: run.trigger === 'leak' })),
      steps,
      visits,
      offsets: trace?.offsets ?? [{ from: 0, seconds: vessel.utcOffsetSeconds }],
      quiet: vessel.quietHours,
      calm: !isTroubled(system.state),
    }),
    [trace, steps, visits, vessel, system.state],
  )
  const onReadout = useCallback((text: string) => {
    if (output.current) output.current.textContent = text
  }, [])

  // React listens to wheels passively; to keep the page still while the chart zooms, ours must not be.
  useEffect(() => {
    const element = figure.current
    if (!element) return
    const onWheel = (event: WheelEvent) => {
      if (!event.ctrlKey && !element.contains(document.activeElement)) return
      event.preventDefault()
      const box = element.getBoundingClientRect()
      const about = Math.min(1, Math.max(0, (event.clientX - box.left - 52) / Math.max(1, box.width - 82)))
      setRange(zoomed(range, event.deltaY > 0 ? 1.25 : 0.8, about, Date.now()))
    }
    element.addEventListener('wheel', onWheel, { passive: false })
    return () => element.removeEventListener('wheel', onWheel)
  }, [range, setRange])
  const onKeyDown = (event: KeyboardEvent) => {
    if (event.target !== figure.current || event.ctrlKey || event.metaKey || event.altKey) return
    const next = byKey(event.key, range, Date.now())
    if (next === undefined) return
    event.preventDefault()
    setRange(next)
  }

  return (
    <section aria-labelledby="trace-title">
      <div className="mt-7 mb-2 flex flex-wrap items-end justify-between gap-3">
        <h2 id="trace-title">Trace</h2>
        <RangeControls range={range} nowMs={now} setRange={setRange} />
      </div>
      {error ? <Trouble title={error.message} retry={() => void mutate()} /> : null}
      {!trace && !error ? <Loading what="the trace" /> : null}
      {trace ? (
        <>
          <p className="mb-2 text-ink-2">
            {traceFinding(trace, (range.toMs - range.fromMs) / 1000, units.vacuum)}
          </p>
          <figure
            ref={figure}
            tabIndex={0}
            onKeyDown={onKeyDown}
            aria-label="Trace of the vacuum. Plus and minus zoom, the arrow keys move, Home goes back to the last two days."
          >
            <TracePlot
              data={data}
              range={range}
              unit={units.vacuum}
              marks={marks}
              onSelect={setRange}
              onReadout={onReadout}
            />
          </figure>
          <p ref={output} className="figure datum min-h-5" aria-hidden="true" />
          <p className="datum no-print">
            Drag across the chart to come closer; click it, and the wheel and the + − ← → keys work. Ticks
            beneath: full, the pump ran by itself; short, a flush. One point covers {trace.resolutionSeconds}{' '}
            s, least and greatest kept.
          </p>
          <RunsTable runs={trace.runs} offsets={marks.offsets} nowMs={now} />
        </>
      ) : null}
    </section>
  )
}
