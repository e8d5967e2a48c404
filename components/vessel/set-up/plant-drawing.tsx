import { BOX_HEIGHT, PlantBox } from '@/components/vessel/set-up/plant-box'
import { layOut, layOutUpright } from '@/components/vessel/set-up/plant-layout'
import type { Part } from '@/shared/schemas'
import type { UnitChoice } from '@/shared/units'

const WIDTH = 172
const GAP = { x: 56, y: 22 }
const UPRIGHT = { width: 320, indent: 26, gap: 12 }

type Drawn = {
  parts: readonly Part[]
  units: UnitChoice
  inTest?: ReadonlySet<string> | undefined
  /** In a narrow column, however wide the window. */
  isNarrow?: boolean
}

/** What a reader who does not see the drawing is told of it. */
const said = ({ parts, inTest }: Drawn): string =>
  `The system drawn: ${parts.map((part) => part.name + (inTest && !inTest.has(part.key) ? ' (not in the test)' : '')).join(', ')}`

/** Heads on the left, through their hoses to the tank, and on to the pump. */
function Across(drawn: Drawn) {
  const { parts, units, inTest } = drawn
  const placed = layOut(parts)
  const columns = Math.max(...placed.map((place) => place.column)) + 1
  const rows = Math.max(...placed.map((place) => place.row)) + 1
  const width = columns * (WIDTH + GAP.x) - GAP.x
  const height = rows * (BOX_HEIGHT + GAP.y) - GAP.y
  const left = (column: number) => column * (WIDTH + GAP.x)
  const top = (row: number) => row * (BOX_HEIGHT + GAP.y)
  const at = new Map(placed.map((place) => [place.part.key, place]))
  return (
    <svg
      viewBox={`-2 -2 ${width + 4} ${height + 4}`}
      className="hidden h-auto w-full sm:block print:block"
      style={{ maxWidth: width + 4 }}
      role="img"
      aria-label={said(drawn)}
    >
      {placed.map(({ part, column, row }) => {
        const parent = part.parent === null ? undefined : at.get(part.parent)
        if (!parent) return null
        const forward = parent.column >= column
        const x1 = forward ? left(column) + WIDTH : left(column)
        const x2 = forward ? left(parent.column) : left(parent.column) + WIDTH
        const y1 = top(row) + BOX_HEIGHT / 2
        const y2 = top(parent.row) + BOX_HEIGHT / 2
        return (
          <path
            key={part.key}
            d={`M${x1} ${y1}H${(x1 + x2) / 2}V${y2}H${x2}`}
            fill="none"
            stroke="var(--shoal)"
            strokeWidth="6"
          />
        )
      })}
      {placed.map(({ part, column, row }) => (
        <g key={part.key} transform={`translate(${left(column)} ${top(row)})`}>
          <PlantBox
            part={part}
            width={WIDTH}
            units={units}
            isOut={inTest !== undefined && !inTest.has(part.key)}
          />
        </g>
      ))}
    </svg>
  )
}

/** For the hand: one part beneath the other, what leads to a part set in under it. */
function Upright(drawn: Drawn) {
  const { parts, units, inTest } = drawn
  const placed = layOutUpright(parts)
  const top = (row: number) => row * (BOX_HEIGHT + UPRIGHT.gap)
  const left = (depth: number) => depth * UPRIGHT.indent
  const height = placed.length * (BOX_HEIGHT + UPRIGHT.gap) - UPRIGHT.gap
  const at = new Map(placed.map((place) => [place.part.key, place]))
  return (
    <svg
      viewBox={`-2 -2 ${UPRIGHT.width + 4} ${height + 4}`}
      className={`block h-auto w-full max-w-[24rem] ${drawn.isNarrow ? '' : 'sm:hidden print:hidden'}`}
      role="img"
      aria-label={said(drawn)}
    >
      {placed.map(({ part, depth, row }) => {
        const parent = part.parent === null ? undefined : at.get(part.parent)
        if (!parent || depth === 0) return null
        return (
          <path
            key={part.key}
            d={`M${left(parent.depth) + UPRIGHT.indent / 2} ${top(parent.row) + BOX_HEIGHT}V${top(row) + BOX_HEIGHT / 2}H${left(depth)}`}
            fill="none"
            stroke="var(--shoal)"
            strokeWidth="5"
          />
        )
      })}
      {placed.map(({ part, depth, row }) => (
        <g key={part.key} transform={`translate(${left(depth)} ${top(row)})`}>
          <PlantBox
            part={part}
            width={UPRIGHT.width - left(depth)}
            units={units}
            isOut={inTest !== undefined && !inTest.has(part.key)}
          />
        </g>
      ))}
    </svg>
  )
}

/** The system drawn as its parts; with `inTest`, what a test leaves out is drawn dashed. */
export function PlantDrawing(drawn: Drawn) {
  if (drawn.parts.length === 0) return null
  return (
    <>
      {drawn.isNarrow ? null : <Across {...drawn} />}
      <Upright {...drawn} />
    </>
  )
}
