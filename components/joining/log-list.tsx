'use client'

import { useState } from 'react'
import { useApi } from '@/components/data/use-api'
import { useNow } from '@/components/data/use-now'
import { dayAndClock } from '@/components/time'
import { Button } from '@/components/ui/button'
import { Loading, Trouble } from '@/components/ui/sheet-states'
import type { List, LogEntry } from '@/shared/schemas'

const A_PAGE = 25

/** Who saw and changed what matters, the newest first; `showVessel` where the list is about several boats. */
export function LogList({
  path,
  offsetSeconds,
  showVessel = false,
}: {
  path: string
  offsetSeconds: number
  showVessel?: boolean
}) {
  const now = useNow(60_000)
  const [limit, setLimit] = useState(A_PAGE)
  const { data, error, mutate } = useApi<List<LogEntry>>(`${path}?limit=${limit}`, { keepPrevious: true })
  if (error) return <Trouble title={error.message} retry={() => void mutate()} />
  if (!data) return <Loading what="the list" />
  if (data.items.length === 0) return <p className="text-ink-2">Nothing yet.</p>
  return (
    <>
      <ol>
        {data.items.map((entry) => (
          <li
            key={entry.id}
            className="grid gap-x-6 border-b border-line py-2 first:pt-0 sm:grid-cols-[10em_minmax(0,1fr)]"
          >
            <time dateTime={entry.at} className="datum pt-0.5 tabular-nums">
              {dayAndClock(entry.at, offsetSeconds, now)}
            </time>
            <span className="break-words">
              <b className="font-semibold">{entry.who}</b> {entry.did}
              {showVessel && entry.vesselName ? (
                <span className="text-ink-2">, {entry.vesselName}</span>
              ) : null}
            </span>
          </li>
        ))}
      </ol>
      {data.next ? (
        <Button weight="plain" onClick={() => setLimit(Math.min(5000, limit * 4))}>
          Show more
        </Button>
      ) : null}
    </>
  )
}
