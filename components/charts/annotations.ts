import type uPlot from 'uplot'
import { clipped, xOf } from '@/components/charts/plot-options'
import type { Colours } from '@/components/charts/use-colours'
import { offsetAt, type ZoneOffset } from '@/components/time'
import type { QuietHours } from '@/shared/schemas'

export type StepMark = { fromMs: number; toMs: number; label: string }
export type VisitMark = { atMs: number; label: string }

const DAY_MS = 86_400_000
const msOfDay = (wall: string): number => (Number(wall.slice(0, 2)) * 60 + Number(wall.slice(3, 5))) * 60_000

/**
 * The quiet hours between two instants, in epoch ms, by the boat's own clock. None when there would be more
 * than 90: nobody sees an hour in a year, and a hatched chart hides what it shows.
 */
export function quietSpans(
  fromMs: number,
  toMs: number,
  quiet: QuietHours,
  offsets: readonly ZoneOffset[],
): { fromMs: number; toMs: number }[] {
  if ((toMs - fromMs) / DAY_MS > 90) return []
  const start = msOfDay(quiet.start)
  const length = (msOfDay(quiet.end) - start + DAY_MS) % DAY_MS
  const spans: { fromMs: number; toMs: number }[] = []
  const firstDay = Math.floor((fromMs + offsetAt(offsets, fromMs) * 1000) / DAY_MS) - 1
  for (let day = firstDay; day * DAY_MS <= toMs + DAY_MS; day += 1) {
    const instant = (wallMs: number) =>
      wallMs - offsetAt(offsets, wallMs - offsetAt(offsets, wallMs) * 1000) * 1000
    const begins = instant(day * DAY_MS + start)
    const ends = instant(day * DAY_MS + start + length)
    if (ends > fromMs && begins < toMs) spans.push({ fromMs: begins, toMs: ends })
  }
  return spans
}

/** Behind the trace: quiet hours shaded. */
export function drawQuiet(
  plot: uPlot,
  colours: Colours,
  spans: readonly { fromMs: number; toMs: number }[],
): void {
  clipped(plot, (context) => {
    context.fillStyle = colours.shallow
    for (const span of spans) {
      const x = xOf(plot, span.fromMs)
      context.fillRect(x, plot.bbox.top, xOf(plot, span.toMs) - x, plot.bbox.height)
    }
  })
}

/** Behind the trace: steps in the leak, each where it happened, as wide as it can be told. */
export function drawSteps(plot: uPlot, colours: Colours, steps: readonly StepMark[]): void {
  const ratio = devicePixelRatio
  clipped(plot, (context) => {
    for (const step of steps) {
      const x = xOf(plot, step.fromMs)
      const width = Math.max(2 * ratio, xOf(plot, step.toMs) - x)
      context.fillStyle = colours['attention-soft']
      context.fillRect(x, plot.bbox.top, width, plot.bbox.height)
      context.fillStyle = colours.attention
      context.font = `${12 * ratio}px ${colours.font}`
      const text = context.measureText(step.label).width
      const right = plot.bbox.left + plot.bbox.width
      const after = x + width + 6 * ratio
      context.textAlign = after + text > right ? 'right' : 'left'
      context.fillText(step.label, after + text > right ? x - 6 * ratio : after, plot.bbox.top + 14 * ratio)
    }
  })
}

/** Over the trace: a flag where somebody came. */
export function drawVisits(plot: uPlot, colours: Colours, visits: readonly VisitMark[]): void {
  const ratio = devicePixelRatio
  const foot = plot.bbox.top + plot.bbox.height
  clipped(plot, (context) => {
    context.fillStyle = colours.act
    context.font = `${12 * ratio}px ${colours.font}`
    for (const visit of visits) {
      const x = xOf(plot, visit.atMs)
      context.fillRect(x, foot - 26 * ratio, 1.4 * ratio, 26 * ratio)
      context.beginPath()
      context.moveTo(x, foot - 26 * ratio)
      context.lineTo(x + 10 * ratio, foot - 21 * ratio)
      context.lineTo(x, foot - 16 * ratio)
      context.fill()
      context.textAlign = 'left'
      context.fillText(visit.label, x + 13 * ratio, foot - 17 * ratio)
    }
  })
}

export type RunMark = { atMs: number; byItself: boolean }

/** Beneath the trace: a full tick where the pump ran by itself, a short thin one for a flush. */
export function drawRuns(plot: uPlot, colours: Colours, runs: readonly RunMark[], calm: boolean): void {
  const { ctx, bbox } = plot
  const ratio = devicePixelRatio
  const top = bbox.top + bbox.height + 3 * ratio
  ctx.save()
  for (const run of runs) {
    const x = Math.round(xOf(plot, run.atMs))
    if (x < bbox.left || x > bbox.left + bbox.width) continue
    ctx.fillStyle = run.byItself ? (calm ? colours.ink : colours.attention) : colours['ink-2']
    if (run.byItself) ctx.fillRect(x - ratio, top, 2 * ratio, 14 * ratio)
    else ctx.fillRect(x - ratio / 2, top + 6 * ratio, ratio, 8 * ratio)
  }
  ctx.restore()
}
