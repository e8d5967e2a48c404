import { inQuiet, onStrip, STRIP_MINUTES, tickPath } from '@/components/charts/scales'
import { clockOfMinute } from '@/components/time'

/** A night as drawn: minutes after 18:00 of the boat's own clock. */
export type StripNight = {
  quiet: readonly [number, number]
  runs: readonly number[]
  flushes: readonly number[]
  expected?: readonly number[]
  /** From this minute on nothing was heard: neither quiet nor not. */
  unheardFrom?: number
}

/** What the strip shows, in words: "quiet", or "3 runs by itself, first at 23:40; 2 flushes". */
export function stripWords(night: StripNight): string {
  const silent = night.unheardFrom
  if (silent !== undefined && silent <= night.quiet[0]) return 'not heard'
  const runs = night.runs.filter((minute) => inQuiet(minute, night.quiet))
  const first = runs[0]
  const parts: string[] = []
  if (first === undefined) parts.push(night.expected?.length ? 'no run by itself yet' : 'quiet')
  else
    parts.push(
      `${runs.length} ${runs.length === 1 ? 'run' : 'runs'} by itself, first at ${clockOfMinute(first)}`,
    )
  if (silent !== undefined) parts.push(`not heard after ${clockOfMinute(silent)}`)
  const flushes = night.flushes.length
  if (flushes > 0) parts.push(`${flushes} ${flushes === 1 ? 'flush' : 'flushes'}`)
  const expected = night.expected?.[0]
  if (expected !== undefined) {
    const count = night.expected?.length ?? 0
    parts.push(`${count} ${count === 1 ? 'run' : 'runs'} expected, first about ${clockOfMinute(expected)}`)
  }
  return parts.join('; ')
}

function Ticks({ d, stroke, width, dash }: { d: string; stroke: string; width: number; dash?: string }) {
  if (d === '') return null
  return (
    <path
      d={d}
      fill="none"
      stroke={stroke}
      strokeWidth={width}
      strokeDasharray={dash}
      vectorEffect="non-scaling-stroke"
    />
  )
}

/** Where nothing was heard there is no band to read: an empty, dashed outline, as the mark of an unheard boat. */
function Silence({ from, height }: { from: number | undefined; height: number }) {
  if (from === undefined) return null
  const start = onStrip(from)
  return (
    <rect
      x={start}
      y="0.7"
      width={STRIP_MINUTES - start}
      height={height - 1.4}
      fill="var(--water)"
      stroke="var(--ink-2)"
      strokeDasharray="2.5 2.5"
      vectorEffect="non-scaling-stroke"
    />
  )
}

/** The drawing inside a strip, in its own coordinates: 960 minutes wide. Shared by one strip and by seven in a row. */
export function StripBody({
  night,
  height,
  calm,
  bold,
}: {
  night: StripNight
  height: number
  calm: boolean
  bold: boolean
}) {
  const [from, to] = [onStrip(night.quiet[0]), onStrip(night.quiet[1])]
  const within = (minute: number) => inQuiet(minute, night.quiet)
  const outside = (minute: number) => !within(minute)
  const top = Math.max(1, Math.round(height * 0.7) / 10)
  const run = (minutes: number[]) => tickPath(minutes, top, height - top)
  const flush = (minutes: number[]) => tickPath(minutes, height * 0.6, height - top)
  const ink = calm ? 'calm' : 'run'
  const width = bold ? 3 : 1.8
  return (
    <>
      <rect width={STRIP_MINUTES} height={height} fill="var(--twilight)" />
      <rect x={from} width={Math.max(0, to - from)} height={height} fill="var(--quiet)" />
      <Silence from={night.unheardFrom} height={height} />
      <Ticks d={flush(night.flushes.filter(outside))} stroke="var(--tick-flush)" width={1.2} />
      <Ticks d={flush(night.flushes.filter(within))} stroke="var(--tick-flush-quiet)" width={1.2} />
      <Ticks d={run(night.runs.filter(outside))} stroke={`var(--tick-${ink})`} width={width} />
      <Ticks d={run(night.runs.filter(within))} stroke={`var(--tick-${ink}-quiet)`} width={width} />
      <Ticks
        d={run([...(night.expected ?? [])])}
        stroke="var(--tick-expected)"
        width={bold ? 3 : 2}
        dash="3.5 3"
      />
    </>
  )
}

/**
 * A night from 18:00 to 10:00 with its quiet hours dark. Full tick: the pump ran by itself. Short faint tick:
 * a flush. Dashed: expected. A quiet night is an unbroken dark band. `calm` draws runs in ink, for a boat
 * that is tight: the hot colour is kept for what matters.
 */
export function NightStrip({
  night,
  height = 26,
  calm = false,
  bold = false,
  label,
}: {
  night: StripNight
  height?: number
  calm?: boolean
  bold?: boolean
  label?: string
}) {
  const words = stripWords(night)
  return (
    <svg
      width="100%"
      height={height}
      viewBox={`0 0 ${STRIP_MINUTES} ${height}`}
      preserveAspectRatio="none"
      role="img"
      aria-label={label ? `${label}: ${words}` : words}
      className="block"
    >
      <StripBody night={night} height={height} calm={calm} bold={bold} />
    </svg>
  )
}

/** Several nights side by side as one drawing, oldest first: what a row of the fleet carries. */
export function NightRow({
  nights,
  height = 20,
  calm = false,
  label,
}: {
  nights: readonly StripNight[]
  height?: number
  calm?: boolean
  label: string
}) {
  const gap = 90
  const width = nights.length * (STRIP_MINUTES + gap) - gap
  return (
    <svg
      width="100%"
      height={height}
      viewBox={`0 0 ${Math.max(1, width)} ${height}`}
      preserveAspectRatio="none"
      role="img"
      aria-label={label}
      className="block"
    >
      {nights.map((night, index) => (
        <g key={index} transform={`translate(${index * (STRIP_MINUTES + gap)} 0)`}>
          <StripBody night={night} height={height} calm={calm} bold={false} />
        </g>
      ))}
    </svg>
  )
}
