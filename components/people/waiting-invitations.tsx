'use client'

import { useState } from 'react'
import { ApiProblem, send } from '@/components/data/request'
import { useNow } from '@/components/data/use-now'
import { ago, span } from '@/components/time'
import { Button } from '@/components/ui/button'
import { Trouble } from '@/components/ui/sheet-states'
import type { Invitation } from '@/shared/schemas'

/** Invitations sent and not accepted: send one again, or take it back. */
export function WaitingInvitations({
  items,
  changed,
}: {
  items: readonly Invitation[]
  changed: () => void
}) {
  const now = useNow(60_000)
  const [busy, setBusy] = useState<string | null>(null)
  const [trouble, setTrouble] = useState<string | null>(null)
  const act = async (invitation: Invitation, method: 'POST' | 'DELETE') => {
    setBusy(invitation.id)
    setTrouble(null)
    try {
      const path = `/api/invitations/${invitation.id}${method === 'POST' ? '/resend' : ''}`
      await send(method, path)
      changed()
    } catch (error) {
      setTrouble(error instanceof ApiProblem ? error.message : 'That did not work. Try again.')
    }
    setBusy(null)
  }
  if (items.length === 0) return <p className="text-ink-2">None waits.</p>
  return (
    <>
      <ul>
        {items.map((item) => {
          const expired = Date.parse(item.expiresAt) <= now
          return (
            <li
              key={item.id}
              className="grid gap-x-6 gap-y-1 border-b border-line py-3 first:pt-0 sm:grid-cols-[minmax(0,1fr)_auto] sm:items-center"
            >
              <span>
                <span className="font-semibold break-all">{item.email}</span>{' '}
                {item.role ? `as ${item.role}` : `as owner of ${item.vesselName ?? 'a boat'}`}
                <span className="datum block">
                  Sent {ago(item.createdAt, now)}
                  {item.invitedBy ? ` by ${item.invitedBy}` : ''},{' '}
                  {expired ? 'has run out' : `good for ${span((Date.parse(item.expiresAt) - now) / 1000)}`}
                </span>
              </span>
              <span className="flex gap-4">
                <Button weight="plain" disabled={busy !== null} onClick={() => void act(item, 'POST')}>
                  {busy === item.id ? 'Working …' : 'Send again'}
                  <span className="sr-only"> to {item.email}</span>
                </Button>
                <Button weight="plain" disabled={busy !== null} onClick={() => void act(item, 'DELETE')}>
                  Take back<span className="sr-only"> the invitation of {item.email}</span>
                </Button>
              </span>
            </li>
          )
        })}
      </ul>
      {trouble ? <Trouble title={trouble} /> : null}
    </>
  )
}
