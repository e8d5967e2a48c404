'use client'

import { useApi } from '@/components/data/use-api'
import { dayAndClock } from '@/components/time'
import { Loading, Trouble } from '@/components/ui/sheet-states'
import type { NoticeWhole } from '@/shared/schemas'

type Told = NoticeWhole['told'][number]

function toldWords(told: Told, at: (instant: string) => string): string {
  const by = told.channel === 'sms' ? 'by text' : 'by e-mail'
  if (told.failedAt) return `${told.name} ${by}: failed ${at(told.failedAt)}`
  if (told.deliveredAt) return `${told.name} ${by}: delivered ${at(told.deliveredAt)}`
  if (told.acceptedAt) return `${told.name} ${by}: sent ${at(told.acceptedAt)}`
  return `${told.name} ${by}: waiting since ${at(told.queuedAt)}`
}

/** What happened to a notice, and who was told of it and when that arrived. */
export function NoticeHistory({
  id,
  offsetSeconds,
  nowMs,
}: {
  id: string
  offsetSeconds: number
  nowMs: number
}) {
  const { data, error, mutate } = useApi<NoticeWhole>(`/api/notices/${id}`)
  if (error) return <Trouble title={error.message} retry={() => void mutate()} />
  if (!data) return <Loading what="the history" />
  const at = (instant: string) => dayAndClock(instant, offsetSeconds, nowMs)
  return (
    <div className="mt-3 grid gap-3">
      <ul>
        {data.events.map((event) => (
          <li key={`${event.at}${event.transition}`}>
            <span className="figure">{at(event.at)}</span> {event.transition}: {event.reason}
          </li>
        ))}
      </ul>
      <ul>
        {data.told.map((told) => (
          <li key={told.messageId}>{toldWords(told, at)}</li>
        ))}
        {data.told.length === 0 ? <li className="text-ink-2">Nobody has been told by message.</li> : null}
      </ul>
    </div>
  )
}
