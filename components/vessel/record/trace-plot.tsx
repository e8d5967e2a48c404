'use client'

import { useEffect, useMemo, useRef } from 'react'
import type uPlot from 'uplot'
import UplotReact from 'uplot-react'
import {
  drawQuiet,
  drawRuns,
  drawSteps,
  drawVisits,
  quietSpans,
  type RunMark,
  type StepMark,
  type VisitMark,
} from '@/components/charts/annotations'
import { timeAxis, valueAxis, type Span } from '@/components/charts/plot-options'
import { useColours } from '@/components/charts/use-colours'
import { useSameOffsets } from '@/components/charts/use-same-offsets'
import { useWidth } from '@/components/charts/use-width'
import { clock, dayOf, offsetAt, type ZoneOffset } from '@/components/time'
import type { QuietHours } from '@/shared/schemas'
import type { VacuumUnit } from '@/shared/units'

export type TraceMarks = {
  runs: readonly RunMark[]
  steps: readonly StepMark[]
  visits: readonly VisitMark[]
  offsets: readonly ZoneOffset[]
  quiet: QuietHours
  calm: boolean
}
type Props = {
  data: uPlot.AlignedData
  range: Span
  unit: VacuumUnit
  marks: TraceMarks
  onSelect: (range: Span) => void
  onReadout: (text: string) => void
}

const HEIGHT = 300

function readout(plot: uPlot, marks: TraceMarks, unit: VacuumUnit): string {
  const index = plot.cursor.idx
  const at = index === null || index === undefined ? undefined : plot.data[0][index]
  if (index === null || index === undefined || at === undefined) return ''
  const offset = offsetAt(marks.offsets, at * 1000)
  const high = plot.data[1]?.[index]
  const low = plot.data[2]?.[index]
  const when = `${dayOf(at * 1000, offset)}, ${clock(at * 1000, offset, true)}`
  if (typeof high !== 'number' || typeof low !== 'number') return `${when}: nothing heard`
  const same = Math.abs(high - low) < 0.005
  return `${when}: ${same ? high.toFixed(2) : `${low.toFixed(2)} to ${high.toFixed(2)}`} ${unit}`
}

/** The saw-tooth itself: least and greatest as an envelope, marks where they happened, runs as ticks beneath. */
export function TracePlot({ data, range, unit, marks, onSelect, onReadout }: Props) {
  const colours = useColours()
  const offsets = useSameOffsets(marks.offsets)
  const [attach, width] = useWidth()
  const plot = useRef<uPlot | null>(null)
  // uPlot calls back long after a render; it finds what is current here.
  const latest = useRef({ marks, range, onSelect, onReadout })
  useEffect(() => {
    latest.current = { marks, range, onSelect, onReadout }
    plot.current?.setScale('x', { min: range.fromMs / 1000, max: range.toMs / 1000 })
    plot.current?.redraw(false, true)
  }, [marks, range, onSelect, onReadout])

  const options = useMemo((): Omit<uPlot.Options, 'width' | 'height'> => {
    const line = { stroke: colours.act, width: 1.4, spanGaps: false, points: { show: false } }
    return {
      legend: { show: false },
      padding: [8, 30, 0, 0],
      cursor: { drag: { x: true, y: false, setScale: false }, points: { size: 6 } },
      scales: {
        x: {
          time: false,
          range: () => [latest.current.range.fromMs / 1000, latest.current.range.toMs / 1000],
        },
      },
      axes: [timeAxis(colours, offsets, 20), valueAxis(colours, (value) => String(value))],
      series: [{}, { ...line }, { ...line }],
      bands: [{ series: [1, 2], fill: colours.shoal }],
      hooks: {
        drawClear: [
          (u) => {
            const { range: shown, marks: current } = latest.current
            drawQuiet(u, colours, quietSpans(shown.fromMs, shown.toMs, current.quiet, current.offsets))
            drawSteps(u, colours, current.steps)
          },
        ],
        draw: [
          (u) => {
            drawRuns(u, colours, latest.current.marks.runs, latest.current.marks.calm)
            drawVisits(u, colours, latest.current.marks.visits)
          },
        ],
        setCursor: [(u) => latest.current.onReadout(readout(u, latest.current.marks, unit))],
        setSelect: [
          (u) => {
            if (u.select.width < 4) return
            const from = u.posToVal(u.select.left, 'x')
            const to = u.posToVal(u.select.left + u.select.width, 'x')
            u.setSelect({ left: 0, top: 0, width: 0, height: 0 }, false)
            latest.current.onSelect({ fromMs: from * 1000, toMs: to * 1000 })
          },
        ],
      },
    }
  }, [colours, unit, offsets])

  return (
    <div ref={attach} style={{ minHeight: HEIGHT }}>
      {width > 0 ? (
        <UplotReact
          options={{ ...options, width, height: HEIGHT }}
          data={data}
          onCreate={(created) => {
            plot.current = created
          }}
          onDelete={() => {
            plot.current = null
          }}
        />
      ) : null}
    </div>
  )
}
