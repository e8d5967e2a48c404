'use client'

import { useId } from 'react'
import type { UseFormRegister } from 'react-hook-form'
import type { FieldTroubles, LeakDownFields } from '@/components/calculators/readings'
import type { UnitChoice } from '@/shared/units'

type Key = keyof LeakDownFields
type RowProps = {
  label: string
  hint?: string
  unit: string
  keys: readonly { key: Key; of: string }[]
  register: UseFormRegister<LeakDownFields>
  troubles: FieldTroubles
}

/** One line of the log sheet: what is read, once or twice, and its unit. */
function Row({ label, hint, unit, keys, register, troubles }: RowProps) {
  const id = useId()
  const trouble = keys.map(({ key }) => troubles[key]).find((text) => text !== undefined)
  return (
    <div
      className="grid grid-cols-[minmax(0,1fr)_5.6rem_5.6rem_2.8rem] items-center gap-x-2 gap-y-1 border-b border-line py-2"
      role="group"
      aria-labelledby={id}
    >
      <span id={id}>
        {label}
        {hint ? <span className="datum block">{hint}</span> : null}
      </span>
      {keys.length === 1 ? <span /> : null}
      {keys.map(({ key, of }) => (
        <input
          key={key}
          aria-label={`${label}, ${of}`}
          aria-invalid={troubles[key] ? true : undefined}
          aria-describedby={trouble ? `${id}-trouble` : undefined}
          inputMode="decimal"
          autoComplete="off"
          className="figure min-h-11 w-full rounded-sm border border-field bg-water px-2.5 aria-invalid:border-attention"
          {...register(key)}
        />
      ))}
      <span className="text-ink-2">{unit}</span>
      {trouble ? (
        <span id={`${id}-trouble`} className="col-span-4 text-note text-attention">
          {trouble}
        </span>
      ) : null}
    </div>
  )
}

const BOTH = (first: Key, second: Key) => [
  { key: first, of: 'first reading' },
  { key: second, of: 'second reading' },
]

/** The readings as a log sheet: first and second side by side, then what is needed once. */
export function ReadingFields({
  units,
  register,
  troubles,
}: {
  units: UnitChoice
  register: UseFormRegister<LeakDownFields>
  troubles: FieldTroubles
}) {
  const shared = { register, troubles }
  return (
    <div>
      <div
        className="grid grid-cols-[minmax(0,1fr)_5.6rem_5.6rem_2.8rem] gap-x-2 border-b-[1.5px] border-ink pb-1.5 text-note text-ink-2"
        aria-hidden="true"
      >
        <span />
        <span>First</span>
        <span>Second</span>
        <span />
      </div>
      <Row
        label="Vacuum"
        hint="after settling for a minute"
        unit={units.vacuum}
        keys={BOTH('first', 'second')}
        {...shared}
      />
      <Row
        label="Air by the tank"
        hint="optional"
        unit={`°${units.temperature}`}
        keys={BOTH('airFirst', 'airSecond')}
        {...shared}
      />
      <Row
        label="Barometer"
        hint="optional"
        unit="hPa"
        keys={BOTH('barometerFirst', 'barometerSecond')}
        {...shared}
      />
      <Row label="Minutes between" unit="min" keys={[{ key: 'minutes', of: 'of the test' }]} {...shared} />
      <Row
        label="Pump’s stop to start"
        hint="the differential"
        unit={units.vacuum}
        keys={[{ key: 'differential', of: 'of the switch' }]}
        {...shared}
      />
      <Row
        label="Volume in the test"
        hint="optional, for the size of the leak"
        unit={units.volume === 'L' ? 'L' : units.volume === 'usGal' ? 'US gal' : 'imp gal'}
        keys={[{ key: 'volume', of: 'gas space' }]}
        {...shared}
      />
      <label className="grid grid-cols-[minmax(0,1fr)_11.7rem_2.8rem] items-center gap-x-2 border-b border-line py-2">
        Gauge
        <select className="min-h-11 rounded-sm border border-field bg-water px-2" {...register('gauge')}>
          <option value="dial">dial</option>
          <option value="digital">digital</option>
          <option value="logger">the boat’s logger</option>
        </select>
      </label>
    </div>
  )
}
