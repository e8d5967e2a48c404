'use client'

import { useState } from 'react'
import { ApiProblem, send } from '@/components/data/request'
import { dayAndClock } from '@/components/time'
import { Button } from '@/components/ui/button'
import { Trouble } from '@/components/ui/sheet-states'
import type { CupTestResult } from '@/shared/schemas'

interface Props {
  test: CupTestResult
  systemId: string
  offsetSeconds: number
  nowMs: number
  changed: () => void
}

/** The bowl that is wet, or was last: what is known of it by now, and how to take it back. */
export function CupTestRunning({ test, systemId, offsetSeconds, nowMs, changed }: Props) {
  const [busy, setBusy] = useState(false)
  const [trouble, setTrouble] = useState<string | null>(null)
  const takeBack = async () => {
    setBusy(true)
    setTrouble(null)
    try {
      await send('DELETE', `/api/systems/${systemId}/cup-tests/${test.id}`)
      changed()
    } catch (error) {
      setTrouble(error instanceof ApiProblem ? error.message : 'That did not work. Try again.')
    } finally {
      setBusy(false)
    }
  }
  const at = (time: string) => dayAndClock(time, offsetSeconds, nowMs)
  return (
    <div>
      <h2>Cup test: {test.headName}</h2>
      <p className="datum mt-1">
        Water in at {at(test.waterAt)}
        {test.flushedAt ? `, flushed at ${at(test.flushedAt)}` : ''}
      </p>
      <p role="status" className={test.verdict === 'seal' ? 'mt-2 font-semibold' : 'mt-2'}>
        {test.sentence}
      </p>
      <Button
        weight="quiet"
        className="mt-3 w-full sm:w-auto"
        disabled={busy}
        onClick={() => void takeBack()}
      >
        {test.open ? 'No water went in: take it back' : 'That was not so: take it back'}
      </Button>
      {trouble ? <Trouble title={trouble} /> : null}
    </div>
  )
}
