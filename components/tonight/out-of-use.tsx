'use client'

import { useId, useState } from 'react'
import { useSWRConfig } from 'swr'
import { ApiProblem, send } from '@/components/data/request'
import { Button } from '@/components/ui/button'
import { Trouble } from '@/components/ui/sheet-states'
import type { StatementValue, System } from '@/shared/schemas'

const SAID: Record<StatementValue, string> = {
  off: 'You said that the system is switched off.',
  'laid-up': 'The system is laid up.',
  'worked-on': 'The system is being worked on.',
}

/** "We switched it off" and "laid up until": what only people know, said here and taken back here. */
export function OutOfUse({ system, title }: { system: System; title: string }) {
  const { mutate } = useSWRConfig()
  const id = useId()
  const [date, setDate] = useState('')
  const [busy, setBusy] = useState(false)
  const [trouble, setTrouble] = useState<string | null>(null)
  const say = async (value: StatementValue | null, until?: string) => {
    setBusy(true)
    setTrouble(null)
    try {
      await send('PUT', `/api/systems/${system.id}/statement`, { value, ...(until ? { until } : {}) })
      await mutate((key) => typeof key === 'string' && /^\/api\/(vessels|systems)\//.test(key))
    } catch (error) {
      setTrouble(error instanceof ApiProblem ? error.message : 'That did not work. Try again.')
    } finally {
      setBusy(false)
    }
  }
  if (system.statement) {
    return (
      <div>
        <h2>{title}</h2>
        <p className="mt-1">{SAID[system.statement.value]}</p>
        <Button weight="quiet" className="mt-2" disabled={busy} onClick={() => void say(null)}>
          It is back in use
        </Button>
        {trouble ? <Trouble title={trouble} /> : null}
      </div>
    )
  }
  return (
    <div>
      <h2>{title}</h2>
      <div className="mt-2 flex flex-wrap items-end gap-3">
        <Button weight="quiet" disabled={busy} onClick={() => void say('off')}>
          We switched it off
        </Button>
        <Button
          weight="quiet"
          disabled={busy}
          onClick={() => void say('laid-up', date ? `${date}T12:00:00Z` : undefined)}
        >
          It is laid up
        </Button>
        <span className="grid gap-1">
          <label htmlFor={id} className="datum">
            until, if you know
          </label>
          <input
            id={id}
            type="date"
            value={date}
            onChange={(event) => setDate(event.target.value)}
            className="min-h-11 rounded-sm border border-field bg-water px-3"
          />
        </span>
      </div>
      <p className="datum mt-2">While it is laid up nothing is sent and nothing is counted.</p>
      {trouble ? <Trouble title={trouble} /> : null}
    </div>
  )
}
