'use client'

import { useState } from 'react'
import { send } from '@/components/data/request'
import { useApi } from '@/components/data/use-api'
import { useNow } from '@/components/data/use-now'
import { CodeForm } from '@/components/register/code-form'
import { useStart } from '@/components/register/start-form'
import { useWork } from '@/components/register/use-commissioning'
import { until } from '@/components/time'
import { Button } from '@/components/ui/button'
import { Caution, Loading, Trouble } from '@/components/ui/sheet-states'
import { TitleBlock } from '@/components/ui/title-block'
import type { Claim } from '@/shared/schemas'

/** Where a logger sends whoever fits it: the code that it shows is confirmed here, never taken on trust. */
export function ClaimSheet({ code }: { code: string | null }) {
  const [asked, setAsked] = useState(code)
  return (
    <>
      <TitleBlock
        title="A logger asks to be claimed"
        datum="It gets its key once you say to which boat it belongs."
      />
      <div className="sheet">
        {asked === null ? (
          <CodeForm word="Look for it" take={(typed) => Promise.resolve(setAsked(typed))} />
        ) : (
          <Asking code={asked} another={() => setAsked(null)} />
        )}
      </div>
    </>
  )
}

function Asking({ code, another }: { code: string; another: () => void }) {
  const now = useNow(5_000)
  const { data, error } = useApi<Claim>(`/api/claims/${encodeURIComponent(code)}`)
  const start = useStart()
  const { busy, trouble, attempt } = useWork()
  const [denied, setDenied] = useState(false)
  if (denied)
    return <p className="text-lead">Refused. The logger shows it, and asks anew when it is restarted.</p>
  if (error)
    return (
      <Trouble title={error.message}>
        <p>
          Codes are good for a quarter of an hour. Restart the logger, or let it ask again, and type what it
          shows now.
        </p>
        <Button weight="plain" onClick={another}>
          Type another code
        </Button>
      </Trouble>
    )
  if (!data) return <Loading what="what asks" />
  return (
    <div className="grid max-w-[44em] gap-5">
      <p className="text-finding tracking-[-0.015em]">
        <strong>{data.serial}</strong> shows <strong className="figure">{data.userCode}</strong> and asks for
        its key.
      </p>
      <p className="text-ink-2">The code runs out {until(data.expiresAt, now)}.</p>
      <Caution>
        Compare code and serial with the logger in your hand. If somebody sent you this code or link, it may
        be theirs: refuse it.
      </Caution>
      {trouble ? <Trouble title={trouble} /> : null}
      <div className="flex flex-wrap gap-3">
        <Button
          disabled={busy}
          onClick={() => void attempt(() => start({ way: 'claim', userCode: data.userCode }))}
        >
          It is the one in my hand: go on
        </Button>
        <Button
          weight="quiet"
          disabled={busy}
          onClick={() =>
            void attempt(async () => {
              await send('POST', `/api/claims/${encodeURIComponent(data.userCode)}`, { answer: 'deny' })
              setDenied(true)
            })
          }
        >
          Refuse it
        </Button>
      </div>
    </div>
  )
}
