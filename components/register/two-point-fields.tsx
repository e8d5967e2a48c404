'use client'

import { useState } from 'react'
import { gaugePa, type Gauge, type GaugeResolutions } from '@/components/register/gauge'
import { GaugeSelect } from '@/components/register/gauge-select'
import { useUnits } from '@/components/shell/units-context'
import { Button } from '@/components/ui/button'
import { Field } from '@/components/ui/field'
import type { StepCheck } from '@/shared/schemas'

type Props = {
  busy: boolean
  word: string
  resolutions: GaugeResolutions
  send: (step: StepCheck) => void
}

/** What the hand gauge says beside the logger. */
export function TwoPointFields({ busy, word, resolutions, send }: Props) {
  const { units } = useUnits()
  const [text, setText] = useState('')
  const [gauge, setGauge] = useState<Gauge>('dial')
  const [error, setError] = useState<string | undefined>(undefined)
  return (
    <form
      className="grid max-w-[26em] gap-4"
      onSubmit={(event) => {
        event.preventDefault()
        const pa = gaugePa(text, units.vacuum)
        setError(pa === null ? 'Write what the gauge reads, as a number.' : undefined)
        if (pa !== null) send({ step: 'done', gaugePa: pa, resolutionPa: resolutions[gauge] })
      }}
    >
      <Field
        label={`Gauge reads, ${units.vacuum}`}
        inputMode="decimal"
        autoComplete="off"
        value={text}
        onChange={(event) => setText(event.target.value)}
        error={error}
      />
      <GaugeSelect value={gauge} choose={setGauge} />
      <div>
        <Button type="submit" disabled={busy}>
          {busy ? 'Comparing …' : word}
        </Button>
      </div>
    </form>
  )
}
