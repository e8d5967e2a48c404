import type uPlot from 'uplot'
import { timeLabels, timeSplits } from '@/components/charts/time-axis'
import type { Colours } from '@/components/charts/use-colours'
import type { ZoneOffset } from '@/components/time'

export type Span = { fromMs: number; toMs: number }

/** Room for one label of the time axis, CSS pixels. */
const LABEL_PX = 86

/** The time axis in the boat's own clock. */
export function timeAxis(colours: Colours, offsets: readonly ZoneOffset[], gap = 6): uPlot.Axis {
  return {
    stroke: colours['ink-2'],
    font: `12px ${colours.font}`,
    grid: { show: false },
    ticks: { stroke: colours.line, width: 1, size: 5 },
    gap,
    size: 40 + gap,
    splits: (plot, _axis, min, max) =>
      timeSplits(min, max, offsets, Math.max(2, Math.floor(plot.width / LABEL_PX))),
    values: (_plot, splits) => timeLabels(splits, offsets),
  }
}

/** A value axis with thin rules across the sheet. */
export function valueAxis(colours: Colours, label: (value: number) => string, splits?: number[]): uPlot.Axis {
  return {
    stroke: colours['ink-2'],
    font: `12px ${colours.font}`,
    size: 52,
    gap: 6,
    grid: { stroke: colours.line, width: 1 },
    ticks: { show: false },
    values: (_plot, values) => values.map(label),
    ...(splits ? { splits: () => splits } : {}),
  }
}

/** Draws within the plotted area alone. */
export function clipped(plot: uPlot, draw: (context: CanvasRenderingContext2D) => void): void {
  const { ctx, bbox } = plot
  ctx.save()
  ctx.beginPath()
  ctx.rect(bbox.left, bbox.top, bbox.width, bbox.height)
  ctx.clip()
  draw(ctx)
  ctx.restore()
}

/** Canvas x of an instant. */
export const xOf = (plot: uPlot, atMs: number): number => plot.valToPos(atMs / 1000, 'x', true)
