'use client'

import { useState } from 'react'
import { PlantDrawing } from '@/components/vessel/set-up/plant-drawing'
import { TestPoints } from '@/components/vessel/set-up/test-points'
import type { System, TestPoint } from '@/shared/schemas'
import { formatVolume, UNKNOWN, type UnitChoice } from '@/shared/units'

/** The system drawn, its parts as a table, and where it can be tested; a test point shows what is in its test. */
export function PlantSheet({
  system,
  points,
  units,
}: {
  system: System
  points: readonly TestPoint[]
  units: UnitChoice
}) {
  const [chosen, setChosen] = useState<number | null>(null)
  const { parts } = system
  if (parts.length === 0) {
    return (
      <p className="text-ink-2">
        No parts are entered yet. Isolation needs them: heads, hoses, tank, switch, pump.
      </p>
    )
  }
  const point = chosen === null ? undefined : points[chosen]
  const names = new Map(parts.map((part) => [part.key, part.name]))
  const total = parts.reduce((sum, part) => sum + (part.volumeM3 ?? 0), 0)
  return (
    <div className="grid gap-6">
      <PlantDrawing parts={parts} units={units} inTest={point && new Set(point.parts)} />
      <table className="ruled">
        <caption className="sr-only">The parts</caption>
        <thead>
          <tr>
            <th scope="col">Part</th>
            <th scope="col">Kind</th>
            <th scope="col">Leads to</th>
            <th scope="col" className="text-right!">
              Volume
            </th>
          </tr>
        </thead>
        <tbody>
          {parts.map((part) => (
            <tr key={part.key}>
              <th scope="row" className="break-words">
                {part.name}
              </th>
              <td>{part.kind}</td>
              <td className="break-words">
                {part.parent === null ? UNKNOWN : (names.get(part.parent) ?? UNKNOWN)}
              </td>
              <td className="text-right whitespace-nowrap">{formatVolume(part.volumeM3, units.volume)}</td>
            </tr>
          ))}
          <tr>
            <th scope="row">All</th>
            <td />
            <td />
            <td className="text-right whitespace-nowrap">
              {total > 0 ? formatVolume(total, units.volume) : UNKNOWN}
            </td>
          </tr>
        </tbody>
      </table>
      <TestPoints points={points} names={names} chosen={chosen} choose={setChosen} />
    </div>
  )
}
