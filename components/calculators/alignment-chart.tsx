import { alignmentOf, type Tick } from '@/components/calculators/alignment'
import { fromPa, type VacuumUnit } from '@/shared/units'

type Geometry = { width: number; left: number; right: number; only: string }
/** On a desk and on paper, and in the hand: the same scales, nearer together so that the figures stay legible. */
const WIDE: Geometry = { width: 720, left: 96, right: 624, only: 'hidden sm:block print:block' }
const NARROW: Geometry = { width: 390, left: 46, right: 330, only: 'sm:hidden print:hidden' }

function Scale({ x, ticks, side }: { x: number; ticks: readonly Tick[]; side: 'left' | 'right' }) {
  const sign = side === 'left' ? -1 : 1
  const ys = ticks.map((tick) => tick.y)
  return (
    <g>
      <line x1={x} x2={x} y1={Math.min(...ys)} y2={Math.max(...ys)} stroke="var(--ink)" strokeWidth="1.4" />
      {ticks.map((tick) => (
        <g key={tick.value}>
          <line
            x1={x}
            x2={x + sign * 10}
            y1={tick.y}
            y2={tick.y}
            stroke="var(--ink)"
            strokeWidth={tick.strong ? 2 : 1}
          />
          <text
            x={x + sign * 16}
            y={tick.y + 4.5}
            textAnchor={side === 'left' ? 'end' : 'start'}
            className="chart-label"
            style={{ fill: 'var(--ink)', fontSize: 13.5, fontWeight: tick.strong ? 700 : 400 }}
          >
            {tick.label}
          </text>
        </g>
      ))}
    </g>
  )
}

type Reading = { minutes: number; lossPa: number } | null
type Props = { differentialPa: number; unit: VacuumUnit; reading: Reading }

/** The chart in the geometry that fits where it is read. */
export function AlignmentChart(props: Props) {
  return (
    <>
      <Drawing {...props} geometry={WIDE} />
      <Drawing {...props} geometry={NARROW} />
    </>
  )
}

/** Lay a straight edge from the minutes waited to the vacuum lost, and read the hours between. */
function Drawing({ differentialPa, unit, reading, geometry }: Props & { geometry: Geometry }) {
  const { width, left, right } = geometry
  const middle = (left + right) / 2
  const chart = alignmentOf(differentialPa, unit)
  const [worst, best] = chart.hourSpan
  const band = (from: number, to: number) => {
    const [a, b] = [Math.max(worst, from), Math.min(best, to)]
    return a < b ? { y: chart.yOfHours(b), height: chart.yOfHours(a) - chart.yOfHours(b) } : null
  }
  const bands = [
    { fill: 'var(--sound-soft)', at: band(8, best) },
    { fill: 'var(--buff)', at: band(3, 8) },
    { fill: 'var(--attention-soft)', at: band(worst, 3) },
  ]
  const onScale =
    reading !== null && reading.minutes >= 5 && reading.minutes <= 60 && reading.lossPa > 0
      ? { y1: chart.yOfMinutes(reading.minutes), y2: chart.yOfLoss(reading.lossPa) }
      : null
  const fits = onScale !== null && onScale.y2 >= 40 && onScale.y2 <= chart.height
  const headY = (ticks: readonly Tick[]) => Math.min(...ticks.map((tick) => tick.y)) - 18
  return (
    <svg
      viewBox={`0 0 ${width} ${chart.height}`}
      className={`h-auto w-full ${geometry.only}`}
      style={{ maxWidth: width }}
      role="img"
      aria-label={`Alignment chart: minutes waited, ${unit} lost, hours held, for ${fromPa(differentialPa, unit).toPrecision(2)} ${unit} between the pump’s stop and start`}
    >
      {bands.map(({ fill, at }) =>
        at === null ? null : (
          <rect key={fill} x={middle - 26} width="52" y={at.y} height={at.height} fill={fill} />
        ),
      )}
      <Scale x={left} ticks={chart.minuteTicks} side="left" />
      <Scale x={right} ticks={chart.lossTicks} side="right" />
      <line
        x1={middle}
        x2={middle}
        y1={chart.yOfHours(best)}
        y2={chart.yOfHours(worst)}
        stroke="var(--ink)"
        strokeWidth="1.4"
      />
      {chart.hourTicks.map((tick) => (
        <g key={tick.value}>
          <line
            x1={middle - 7}
            x2={middle + 7}
            y1={tick.y}
            y2={tick.y}
            stroke="var(--ink)"
            strokeWidth={tick.strong ? 2.6 : 1}
          />
          <text
            x={middle + 34}
            y={tick.y + 4.5}
            className="chart-label"
            style={{ fill: 'var(--ink)', fontSize: 13.5, fontWeight: tick.strong ? 700 : 400 }}
          >
            {tick.label}
          </text>
        </g>
      ))}
      {[
        { x: left, y: headY(chart.minuteTicks), text: 'min waited' },
        { x: middle, y: chart.yOfHours(best) - 14, text: 'holds' },
        { x: right, y: headY(chart.lossTicks), text: `${unit} lost` },
      ].map((head) => (
        <text
          key={head.text}
          x={head.x}
          y={head.y}
          textAnchor="middle"
          className="chart-label"
          style={{ fontStyle: 'italic', fontSize: 13 }}
        >
          {head.text}
        </text>
      ))}
      {onScale && fits ? (
        <g className="no-print">
          <line x1={left} y1={onScale.y1} x2={right} y2={onScale.y2} stroke="var(--act)" strokeWidth="2" />
          <circle cx={middle} cy={(onScale.y1 + onScale.y2) / 2} r="6" fill="var(--act)" />
        </g>
      ) : null}
    </svg>
  )
}
