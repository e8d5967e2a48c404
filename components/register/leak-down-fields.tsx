'use client'

import { useState } from 'react'
import { numberOf } from '@/components/calculators/readings'
import { send as sendJson } from '@/components/data/request'
import { useNow } from '@/components/data/use-now'
import { gaugePa, type Gauge, type GaugeResolutions } from '@/components/register/gauge'
import { GaugeSelect } from '@/components/register/gauge-select'
import { useUnits } from '@/components/shell/units-context'
import { Button } from '@/components/ui/button'
import { Field } from '@/components/ui/field'
import type { LeakDown, StepCheck } from '@/shared/schemas'
import { formatDuration, formatRate, formatRateRange } from '@/shared/units'

type Props = {
  busy: boolean
  word: string
  beganAt: string
  resolutions: GaugeResolutions
  send: (step: StepCheck) => void
}

/** Two readings of the hand gauge, with a clock that runs from the beginning of the check, wherever it is read. */
export function LeakDownFields({ busy, word, beganAt, resolutions, send }: Props) {
  const { units } = useUnits()
  const now = useNow(1_000)
  const [first, setFirst] = useState('')
  const [second, setSecond] = useState('')
  const [minutes, setMinutes] = useState('')
  const [gauge, setGauge] = useState<Gauge>('dial')
  const [error, setError] = useState<string | undefined>(undefined)
  const [soFar, setSoFar] = useState<LeakDown | null>(null)
  const elapsed = Math.max(0, Math.floor((now - Date.parse(beganAt)) / 1000))
  const read = () => {
    const [startPa, endPa] = [gaugePa(first, units.vacuum), gaugePa(second, units.vacuum)]
    const length = minutes.trim() === '' ? elapsed / 60 : numberOf(minutes)
    const fits = startPa !== null && endPa !== null && length !== null && length >= 1
    setError(fits ? undefined : 'Two readings as numbers, at least a minute apart.')
    return fits ? { startPa, endPa, seconds: length * 60 } : null
  }
  const preview = async () => {
    const readings = read()
    if (readings === null) return
    const asked = { ...readings, resolutionPa: resolutions[gauge] }
    setSoFar(await sendJson<LeakDown>('POST', '/api/leak-down', asked).catch(() => null))
  }
  return (
    <form
      className="grid max-w-[30em] gap-4"
      onSubmit={(event) => {
        event.preventDefault()
        const leakDown = read()
        if (leakDown !== null) send({ step: 'done', leakDown, resolutionPa: resolutions[gauge] })
      }}
    >
      <p>
        <span className="figure text-timer" role="timer" aria-label="Since the check began">
          {String(Math.floor(elapsed / 60)).padStart(2, '0')}:{String(elapsed % 60).padStart(2, '0')}
        </span>
        <span className="datum block">since the check began; it runs on when you leave this page</span>
      </p>
      <div className="grid gap-4 sm:grid-cols-3">
        <Field
          label={`First, ${units.vacuum}`}
          inputMode="decimal"
          autoComplete="off"
          value={first}
          onChange={(event) => setFirst(event.target.value)}
        />
        <Field
          label={`Second, ${units.vacuum}`}
          inputMode="decimal"
          autoComplete="off"
          value={second}
          onChange={(event) => setSecond(event.target.value)}
          error={error}
        />
        <Field
          label="Minutes between"
          inputMode="decimal"
          autoComplete="off"
          placeholder={String(Math.max(1, Math.floor(elapsed / 60)))}
          value={minutes}
          onChange={(event) => setMinutes(event.target.value)}
        />
      </div>
      <GaugeSelect value={gauge} choose={setGauge} />
      <div className="flex flex-wrap gap-3">
        <Button type="submit" disabled={busy}>
          {busy ? 'Judging …' : word}
        </Button>
        <Button weight="quiet" onClick={() => void preview()}>
          What would it show?
        </Button>
      </div>
      <p role="status" className="min-h-6">
        {soFar ? leakDownWords(soFar, (pa) => formatRate(pa, units.vacuum), units.vacuum) : ''}
      </p>
    </form>
  )
}

function leakDownWords(
  answer: LeakDown,
  rate: (pa: number) => string,
  unit: Parameters<typeof formatRate>[1],
): string {
  const figures = `${rate(answer.paPerHour)} (${formatRateRange(answer.low, answer.high, unit)})`
  if (answer.verdict === 'cannot-tell')
    return answer.moreMinutes === null
      ? `${figures}: a rise is weather or temperature.`
      : `${figures}: cannot tell yet, ${answer.moreMinutes} more minutes.`
  const holds = answer.holdSeconds === null ? '' : `, would hold ${formatDuration(answer.holdSeconds)}`
  return `${figures}: ${answer.verdict.replace('-', ' ')}${holds}.`
}
