'use client'

import { useEffect, useMemo, useRef } from 'react'
import type uPlot from 'uplot'
import UplotReact from 'uplot-react'
import { drawSteps, drawVisits, type StepMark, type VisitMark } from '@/components/charts/annotations'
import { clipped, timeAxis, valueAxis, xOf, type Span } from '@/components/charts/plot-options'
import { useColours, type Colours } from '@/components/charts/use-colours'
import { useSameOffsets } from '@/components/charts/use-same-offsets'
import { useWidth } from '@/components/charts/use-width'
import type { Tone } from '@/components/states'
import type { ZoneOffset } from '@/components/time'

/** `full` is a filled disc, `open` a hollow triangle that points up: at least that much. */
export type ScatterPoint = { atMs: number; value: number; shape: 'full' | 'open'; tone: Tone }
export type ReferenceLine = { value: number; dotted?: boolean }

type Props = {
  points: readonly ScatterPoint[]
  range: Span
  low: number
  high: number
  logarithmic: boolean
  ticks: readonly number[]
  tickLabel: (value: number) => string
  lines: readonly ReferenceLine[]
  steps: readonly StepMark[]
  visits: readonly VisitMark[]
  offsets: readonly ZoneOffset[]
  axisPx?: number
  height?: number
}

function drawPoint(
  context: CanvasRenderingContext2D,
  x: number,
  y: number,
  shape: ScatterPoint['shape'],
  ratio: number,
) {
  context.beginPath()
  if (shape === 'full') {
    context.arc(x, y, 3.6 * ratio, 0, 2 * Math.PI)
    context.fill()
    return
  }
  const size = 3 * ratio
  context.moveTo(x, y - size)
  context.lineTo(x + size, y + size * 0.8)
  context.lineTo(x - size, y + size * 0.8)
  context.closePath()
  context.stroke()
}

function drawPoints(plot: uPlot, colours: Colours, points: readonly ScatterPoint[]) {
  const ratio = devicePixelRatio
  clipped(plot, (context) => {
    context.lineWidth = 1.2 * ratio
    // Hollow ones first: what the pump did by itself must not be hidden by what a flush cut short.
    for (const point of [...points].sort((a, b) => (a.shape === b.shape ? 0 : a.shape === 'open' ? -1 : 1))) {
      context.fillStyle = colours[point.tone]
      context.strokeStyle = point.shape === 'open' ? colours.field : colours[point.tone]
      drawPoint(context, xOf(plot, point.atMs), plot.valToPos(point.value, 'y', true), point.shape, ratio)
    }
  })
}

function drawLines(plot: uPlot, colours: Colours, lines: readonly ReferenceLine[]) {
  const ratio = devicePixelRatio
  const { left, width } = plot.bbox
  clipped(plot, (context) => {
    context.strokeStyle = colours['ink-2']
    context.lineWidth = ratio
    for (const line of lines) {
      const y = Math.round(plot.valToPos(line.value, 'y', true)) + 0.5
      context.setLineDash(line.dotted ? [2 * ratio, 3 * ratio] : [])
      context.beginPath()
      context.moveTo(left, y)
      context.lineTo(left + width, y)
      context.stroke()
    }
    context.setLineDash([])
  })
}

/** Points in time against a value, with lines to hold them to, steps and visits in their places. */
export function ScatterPlot(props: Props) {
  const { low, high, logarithmic, ticks, tickLabel, axisPx = 52, height = 260 } = props
  const colours = useColours()
  const offsets = useSameOffsets(props.offsets)
  const [attach, width] = useWidth()
  const plot = useRef<uPlot | null>(null)
  const latest = useRef(props)
  useEffect(() => {
    latest.current = props
    plot.current?.setScale('x', { min: props.range.fromMs / 1000, max: props.range.toMs / 1000 })
    plot.current?.redraw(false, true)
  }, [props])
  const data = useMemo(
    (): uPlot.AlignedData => [
      [props.range.fromMs / 1000, props.range.toMs / 1000],
      [low, high],
    ],
    [props.range, low, high],
  )
  const options = useMemo(
    (): Omit<uPlot.Options, 'width' | 'height'> => ({
      legend: { show: false },
      padding: [8, 30, 0, 0],
      cursor: { show: false },
      scales: {
        x: {
          time: false,
          range: () => [latest.current.range.fromMs / 1000, latest.current.range.toMs / 1000],
        },
        y: { distr: logarithmic ? 3 : 1, range: () => [low, high] },
      },
      axes: [
        timeAxis(colours, offsets),
        { ...valueAxis(colours, tickLabel, [...ticks]), size: axisPx, filter: (_plot, splits) => splits },
      ],
      series: [{}, { paths: () => null, points: { show: false } }],
      hooks: {
        drawClear: [(u) => drawSteps(u, colours, latest.current.steps)],
        draw: [
          (u) => {
            drawLines(u, colours, latest.current.lines)
            drawPoints(u, colours, latest.current.points)
            drawVisits(u, colours, latest.current.visits)
          },
        ],
      },
    }),
    [colours, low, high, logarithmic, ticks, tickLabel, axisPx, offsets],
  )
  return (
    <div ref={attach} style={{ minHeight: height }}>
      {width > 0 ? (
        <UplotReact
          options={{ ...options, width, height }}
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
