import { layOut } from '@/components/vessel/set-up/plant-layout'
import type { Part } from '@/shared/schemas'
import { formatVolume, type UnitChoice } from '@/shared/units'

const BOX = { width: 168, height: 56 }
const GAP = { x: 56, y: 22 }

/** The system drawn as its parts: heads on the left, through their hoses to the tank, and on to the pump. */
export function PlantDrawing({ parts, units }: { parts: readonly Part[]; units: UnitChoice }) {
  const placed = layOut(parts)
  if (placed.length === 0) return null
  const columns = Math.max(...placed.map((place) => place.column)) + 1
  const rows = Math.max(...placed.map((place) => place.row)) + 1
  const width = columns * (BOX.width + GAP.x) - GAP.x
  const height = rows * (BOX.height + GAP.y) - GAP.y
  const left = (column: number) => column * (BOX.width + GAP.x)
  const top = (row: number) => row * (BOX.height + GAP.y)
  const at = new Map(placed.map((place) => [place.part.key, place]))
  return (
    <svg
      viewBox={`-2 -2 ${width + 4} ${height + 4}`}
      className="block h-auto w-full"
      style={{ maxWidth: width + 4 }}
      role="img"
      aria-label={`The system drawn: ${parts.map((part) => part.name).join(', ')}`}
    >
      {placed.map(({ part, column, row }) => {
        const parent = part.parent === null ? undefined : at.get(part.parent)
        if (!parent) return null
        const forward = parent.column >= column
        const x1 = forward ? left(column) + BOX.width : left(column)
        const x2 = forward ? left(parent.column) : left(parent.column) + BOX.width
        const y1 = top(row) + BOX.height / 2
        const y2 = top(parent.row) + BOX.height / 2
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
          <rect
            width={BOX.width}
            height={BOX.height}
            fill="var(--shallow)"
            stroke="var(--field)"
            strokeWidth="1.2"
          />
          <text x="10" y="23" style={{ fill: 'var(--ink)', fontWeight: 600, fontSize: 14.5 }}>
            {part.name.length > 20 ? `${part.name.slice(0, 19)}…` : part.name}
          </text>
          <text x="10" y="42" style={{ fill: 'var(--ink-2)', fontSize: 13 }}>
            {part.volumeM3 ? formatVolume(part.volumeM3, units.volume) : part.kind}
          </text>
        </g>
      ))}
    </svg>
  )
}
