'use client'

import Link from 'next/link'
import { useState, type ReactNode } from 'react'
import useSWR from 'swr'
import { ApiProblem, request, send } from '@/components/data/request'
import { NOTICE_WORDS } from '@/components/notices/words'
import { Button } from '@/components/ui/button'
import { Caution, Empty, Loading, Trouble } from '@/components/ui/sheet-states'
import type { LinkedMessage, LinkOutcome } from '@/shared/schemas'

type Word = 'OK' | 'VISIT' | 'MUTE' | 'OFF' | 'LAIDUP'
type Told = LinkedMessage['notices'][number]

/** What a message told, and what its receiver can do about it without signing in; each press acts once. */
export function LinkSheet({ code }: { code: string }) {
  const path = `/api/links/${encodeURIComponent(code)}`
  const { data, error, mutate } = useSWR<LinkedMessage, ApiProblem>(path, request)
  const [outcome, setOutcome] = useState<string | null>(null)
  const [trouble, setTrouble] = useState<string | null>(null)
  const [busy, setBusy] = useState(false)

  if (error) {
    return (
      <div className="sheet">
        <Trouble title={error.message}>
          <Link href="/tonight">Sign in and see tonight</Link>
        </Trouble>
      </div>
    )
  }
  if (data === undefined)
    return (
      <Sheet>
        <Loading what="what the message told" />
      </Sheet>
    )
  if (data.notices.length === 0) {
    return (
      <Sheet>
        <Empty title="There is nothing to act on any more.">What this message told of is over.</Empty>
      </Sheet>
    )
  }

  const act = async (word: Word, systemId?: string) => {
    setBusy(true)
    setTrouble(null)
    try {
      const answer = await send<LinkOutcome>(
        'POST',
        path,
        systemId === undefined ? { word } : { word, systemId },
      )
      setOutcome(answer?.sentence ?? 'Done.')
      await mutate()
    } catch (problem) {
      setTrouble(problem instanceof ApiProblem ? problem.message : 'That did not work. Try again.')
    } finally {
      setBusy(false)
    }
  }

  return (
    <Sheet>
      {outcome ? (
        <p role="status" className="max-w-[38em] border-l-2 border-act py-1 pl-4 text-lead font-semibold">
          {outcome}
        </p>
      ) : null}
      {trouble ? <Trouble title={trouble} /> : null}
      {boats(data.notices).map(({ systemId, name, notices }) => (
        <section key={systemId} className="border-t border-line py-5 first:border-t-0">
          <h2 className="mt-0">{name}</h2>
          <ul className="my-2 grid gap-1">
            {notices.map((notice) => (
              <li key={notice.kind}>
                <b>{NOTICE_WORDS[notice.kind]}.</b> {notice.reason}.{' '}
                <span className="text-ink-2">{standing(notice)}</span>
              </li>
            ))}
          </ul>
          <div className="mt-4 grid max-w-[28em] gap-2.5">
            <Button disabled={busy} onClick={() => void act('VISIT', systemId)}>
              Ask the shop for a visit
            </Button>
            <Button weight="quiet" disabled={busy} onClick={() => void act('OK', systemId)}>
              I have seen it
            </Button>
            <Button weight="quiet" disabled={busy} onClick={() => void act('MUTE', systemId)}>
              Nothing more about this for a week
            </Button>
            <Button weight="quiet" disabled={busy} onClick={() => void act('OFF', systemId)}>
              We switched the system off
            </Button>
          </div>
        </section>
      ))}
      <Caution>
        If you switch the pump off, use its own breaker and tell everybody aboard: nobody can flush then.
        Never a breaker that feeds a bilge pump.
      </Caution>
      <p className="py-5">
        <Link href="/tonight">Sign in for tonight and the whole record</Link>
      </p>
    </Sheet>
  )
}

function Sheet({ children }: { children: ReactNode }) {
  return <div className="sheet">{children}</div>
}

function boats(notices: readonly Told[]) {
  return [...new Set(notices.map(({ systemId }) => systemId))].map((systemId) => {
    const told = notices.filter((notice) => notice.systemId === systemId)
    return {
      systemId,
      name: [told[0]?.vesselName, told[0]?.systemName].filter(Boolean).join(', '),
      notices: told,
    }
  })
}

function standing(notice: Told): string {
  if (notice.closedAt !== null) return 'It is over.'
  if (notice.snoozedUntil !== null) return 'Muted for now.'
  return notice.acknowledgedAt !== null ? 'Seen.' : ''
}
