'use client'

import { useState } from 'react'
import { useApi } from '@/components/data/use-api'
import { useNow } from '@/components/data/use-now'
import { MessageView } from '@/components/outbox/message-view'
import { ago } from '@/components/time'
import { Empty, Loading, Trouble } from '@/components/ui/sheet-states'
import { TitleBlock } from '@/components/ui/title-block'
import type { Outbox } from '@/shared/schemas'

/** What the demo has sent, as it arrived: nothing here left the machine. */
export function OutboxSheet() {
  const now = useNow()
  const { data, error, mutate } = useApi<Outbox>('/api/outbox', { refreshMs: 15_000 })
  const [chosen, setChosen] = useState<string | null>(null)
  const items = [...(data?.items ?? [])].sort((a, b) => Date.parse(b.at) - Date.parse(a.at))
  const message = items.find((item) => item.id === chosen) ?? items[0]
  return (
    <>
      <TitleBlock
        title="Outbox"
        datum="What the demo’s mail and text services took in. Nothing here left this machine."
        aside={data ? [`${items.length} ${items.length === 1 ? 'message' : 'messages'}`] : []}
      />
      <div className="sheet">
        {error ? <Trouble title={error.message} retry={() => void mutate()} /> : null}
        {!data && !error ? <Loading what="the outbox" /> : null}
        {data && items.length === 0 ? (
          <Empty title="Nothing has been sent yet">
            Messages go out when a notice opens, and two hours before a night in which a pump is likely to
            run.
          </Empty>
        ) : null}
        {message ? (
          <div className="grid gap-x-10 gap-y-6 lg:grid-cols-[minmax(0,26rem)_minmax(0,1fr)]">
            <ul
              className="border-t-[1.5px] border-ink lg:max-h-[75vh] lg:overflow-y-auto"
              aria-label="Messages"
            >
              {items.map((item) => (
                <li key={item.id} className="border-b border-line">
                  <button
                    type="button"
                    aria-current={item.id === message.id ? 'true' : undefined}
                    className="grid w-full gap-0.5 py-2.5 pr-3 pl-3 text-left hover:bg-shallow aria-[current]:bg-shallow aria-[current]:inset-shadow-[3px_0_0_var(--ink)]"
                    onClick={() => setChosen(item.id)}
                  >
                    <span className="datum flex justify-between gap-3">
                      <span>
                        {item.channel === 'sms' ? 'Text' : 'E-mail'} to {item.to}
                      </span>
                      <span>{ago(item.at, now)}</span>
                    </span>
                    <span className="line-clamp-2 font-semibold">{item.subject ?? item.text}</span>
                  </button>
                </li>
              ))}
            </ul>
            <MessageView message={message} />
          </div>
        ) : null}
      </div>
    </>
  )
}
