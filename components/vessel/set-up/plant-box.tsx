import { PartGlyph } from '@/components/vessel/set-up/part-glyph'
import type { Part } from '@/shared/schemas'
import { formatVolume, type UnitChoice } from '@/shared/units'

export const BOX_HEIGHT = 56
const GLYPH = 32
const MARGIN = 10
/** Width of a letter at its widest usual, so that no name runs out of its box. */
const LETTER = 8.4

/** One part drawn. Outside of the test it is dashed and empty, so that it is told apart without colour. */
export function PlantBox({
  part,
  width,
  units,
  isOut,
}: {
  part: Part
  width: number
  units: UnitChoice
  isOut: boolean
}) {
  const letters = Math.floor((width - 2 * MARGIN) / LETTER)
  const name = part.name.length > letters ? `${part.name.slice(0, letters - 1)}…` : part.name
  return (
    <>
      <rect
        width={width}
        height={BOX_HEIGHT}
        fill={isOut ? 'var(--water)' : 'var(--shallow)'}
        stroke={isOut ? 'var(--field)' : 'var(--ink)'}
        strokeWidth="1.2"
        strokeDasharray={isOut ? '4 4' : undefined}
      />
      <text
        x="10"
        y="23"
        style={{ fill: isOut ? 'var(--ink-2)' : 'var(--ink)', fontWeight: 600, fontSize: 14.5 }}
      >
        {name}
      </text>
      <text x="10" y="42" style={{ fill: 'var(--ink-2)', fontSize: 13 }}>
        {part.volumeM3 ? `${part.kind}, ${formatVolume(part.volumeM3, units.volume)}` : part.kind}
      </text>
      <PartGlyph kind={part.kind} x={width - GLYPH} y={27} />
    </>
  )
}
