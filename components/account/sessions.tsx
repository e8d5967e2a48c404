'use client'

import { useState } from 'react'
import { ApiProblem, send } from '@/components/data/request'
import { useNow } from '@/components/data/use-now'
import { deviceName } from '@/components/account/device-name'
import { ago } from '@/components/time'
import { Button } from '@/components/ui/button'
import { Trouble } from '@/components/ui/sheet-states'
import type { Session } from '@/shared/schemas'

/** Every device that is signed in; one or all others can be signed out. */
export function Sessions({ items, changed }: { items: readonly Session[]; changed: () => void }) {
  const now = useNow(60_000)
  const [busy, setBusy] = useState(false)
  const [trouble, setTrouble] = useState<string | null>(null)
  const end = async (path: string) => {
    setBusy(true)
    setTrouble(null)
    try {
      await send('DELETE', path)
      changed()
    } catch (error) {
      setTrouble(error instanceof ApiProblem ? error.message : 'That did not work. Try again.')
    }
    setBusy(false)
  }
  return (
    <>
      <ul>
        {items.map((session) => (
          <li
            key={session.id}
            className="flex flex-wrap items-center justify-between gap-x-6 border-b border-line py-2 first:pt-0"
          >
            <span>
              <b className="font-semibold">{deviceName(session.userAgent)}</b>
              <span className="datum block">
                {session.current ? 'this device, ' : ''}used {ago(session.lastSeenAt, now)}, signed in{' '}
                {ago(session.createdAt, now)}
              </span>
            </span>
            {session.current ? null : (
              <Button
                weight="plain"
                disabled={busy}
                onClick={() => void end(`/api/me/sessions/${session.id}`)}
              >
                Sign out<span className="sr-only"> {deviceName(session.userAgent)}</span>
              </Button>
            )}
          </li>
        ))}
      </ul>
      {items.length > 1 ? (
        <Button weight="quiet" className="mt-3" disabled={busy} onClick={() => void end('/api/me/sessions')}>
          Sign every other device out
        </Button>
      ) : null}
      {trouble ? <Trouble title={trouble} /> : null}
    </>
  )
}
