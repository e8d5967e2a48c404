'use client'

import { useState } from 'react'
import { ApiProblem, send } from '@/components/data/request'
import { useApi } from '@/components/data/use-api'
import { Button } from '@/components/ui/button'
import { Trouble } from '@/components/ui/sheet-states'
import type { List, Notice, Vessel } from '@/shared/schemas'

const WEEK_MS = 7 * 86_400_000

/** "I know": the warning that stands open is not repeated for a week. Shown only when there is one. */
export function Hush({ vessel }: { vessel: Vessel }) {
  const notices = useApi<List<Notice>>(`/api/notices?state=open&vessel=${vessel.id}`)
  const [trouble, setTrouble] = useState<string | null>(null)
  const warning = notices.data?.items.find((notice) => notice.kind === 'night-warning')
  if (!warning || !vessel.rights.acknowledge) return null
  const change = async (snoozedUntil: string | null) => {
    setTrouble(null)
    try {
      await send('PATCH', `/api/notices/${warning.id}`, { snoozedUntil })
      await notices.mutate()
    } catch (error) {
      setTrouble(error instanceof ApiProblem ? error.message : 'That did not work. Try again.')
    }
  }
  return (
    <div>
      {warning.snoozedUntil ? (
        <p>
          You are not reminded of this for a week.{' '}
          <Button weight="plain" onClick={() => void change(null)}>
            Remind me again
          </Button>
        </p>
      ) : (
        <Button
          weight="quiet"
          className="w-full sm:w-auto"
          onClick={() => void change(new Date(Date.now() + WEEK_MS).toISOString())}
        >
          I know, don’t remind me this week
        </Button>
      )}
      {trouble ? <Trouble title={trouble} /> : null}
    </div>
  )
}
