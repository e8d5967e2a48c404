'use client'

import { useUnits } from '@/components/shell/units-context'
import type { VacuumUnit } from '@/shared/units'

const CHOICES: { value: VacuumUnit; word: string }[] = [
  { value: 'inHg', word: 'inHg' },
  { value: 'kPa', word: 'kPa' },
  { value: 'mbar', word: 'mbar' },
]

/** The vacuum unit of every figure on the sheet. */
export function UnitsSelect() {
  const { units, setUnits } = useUnits()
  return (
    <select
      aria-label="Unit of vacuum"
      className="min-h-9 rounded-sm border border-transparent bg-water px-1 text-ink-2 hover:border-field"
      value={units.vacuum}
      onChange={(event) => {
        const chosen = CHOICES.find((choice) => choice.value === event.target.value)
        if (chosen) setUnits({ ...units, vacuum: chosen.value })
      }}
    >
      {CHOICES.map((choice) => (
        <option key={choice.value} value={choice.value}>
          {choice.word}
        </option>
      ))}
    </select>
  )
}
