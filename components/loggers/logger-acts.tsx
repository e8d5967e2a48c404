'use client'

import { useState, type ReactNode } from 'react'
import { send, withQuery } from '@/components/data/request'
import type { LoggerView } from '@/components/loggers/health'
import { KeyShown } from '@/components/register/key-shown'
import { useWork } from '@/components/register/use-commissioning'
import { Button, LinkButton } from '@/components/ui/button'
import { Trouble } from '@/components/ui/sheet-states'
import type { LoggerKey } from '@/shared/schemas'

/** Roll the key, replace, move, retire: each says what stays and how it is undone. */
export function LoggerActs({ view, refresh }: { view: LoggerView; refresh: () => Promise<unknown> }) {
  const { logger, place } = view
  const again = withQuery('/register', { serial: logger.serial })
  const known = withQuery('/register', { serial: logger.serial, known: 'yes' })
  if (place === 'retired')
    return (
      <Act
        title="Take it back"
        says="Registered again with its serial it gets a new key and goes on; its past stays where it was."
      >
        <LinkButton href={again} weight="quiet">
          Register it again
        </LinkButton>
      </Act>
    )
  return (
    <div className="grid gap-8">
      <RollKey view={view} refresh={refresh} />
      {logger.fitted ? (
        <Act
          title="Replace it"
          says={`Another logger takes its place on ${logger.fitted.vesselName}: this one’s fitting ends when the other’s begins, the record goes on without a break, and this one goes to stock.`}
        >
          <LinkButton href={withQuery('/register', { system: logger.fitted.systemId })} weight="quiet">
            Register the one that replaces it
          </LinkButton>
        </Act>
      ) : null}
      <Act
        title={logger.fitted ? 'Move it to another boat' : 'Fit it to a boat'}
        says={
          logger.fitted
            ? `It keeps its key. ${logger.fitted.vesselName} keeps what it measured there; the other boat’s record begins when it is fitted.`
            : 'It keeps its key and its rhythm.'
        }
      >
        <LinkButton href={known} weight="quiet">
          {logger.fitted ? 'Choose the other boat' : 'Choose the boat'}
        </LinkButton>
      </Act>
      <Retire view={view} refresh={refresh} />
    </div>
  )
}

function Act({ title, says, children }: { title: string; says: string; children: ReactNode }) {
  return (
    <section>
      <h2>{title}</h2>
      <p className="mt-1 mb-3 max-w-[40em] text-ink-2">{says}</p>
      {children}
    </section>
  )
}

function RollKey({ view, refresh }: { view: LoggerView; refresh: () => Promise<unknown> }) {
  const [sure, setSure] = useState(false)
  const [key, setKey] = useState<string | null>(null)
  const { busy, trouble, attempt } = useWork()
  const { id, serial } = view.logger
  const roll = () =>
    attempt(async () => {
      const made = await send<LoggerKey>('POST', `/api/loggers/${id}/key`)
      setKey(made?.key ?? null)
      setSure(false)
      await refresh()
    })
  return (
    <Act
      title="Roll its key"
      says="For a key that was lost or seen. The old key is void at once, and the logger is not heard until it has the new one; what it keeps meanwhile comes in afterwards."
    >
      {key ? <KeyShown value={key} serial={serial} /> : null}
      {sure ? (
        <div className="flex flex-wrap gap-3">
          <Button disabled={busy} onClick={() => void roll()}>
            Make the new key now
          </Button>
          <Button weight="quiet" onClick={() => setSure(false)}>
            Keep the old one
          </Button>
        </div>
      ) : (
        <Button weight="quiet" onClick={() => setSure(true)}>
          Roll the key
        </Button>
      )}
      {trouble ? <Trouble title={trouble} /> : null}
    </Act>
  )
}

function Retire({ view, refresh }: { view: LoggerView; refresh: () => Promise<unknown> }) {
  const [sure, setSure] = useState(false)
  const { busy, trouble, attempt } = useWork()
  return (
    <Act
      title="Retire it"
      says="Its uploads are refused from then on; what it measured stays. The way back: register it again with its serial."
    >
      {sure ? (
        <div className="flex flex-wrap gap-3">
          <Button
            disabled={busy}
            onClick={() =>
              void attempt(async () => {
                await send('DELETE', `/api/loggers/${view.logger.id}`)
                await refresh()
              })
            }
          >
            Retire {view.logger.serial}
          </Button>
          <Button weight="quiet" onClick={() => setSure(false)}>
            Keep it in use
          </Button>
        </div>
      ) : (
        <Button weight="quiet" onClick={() => setSure(true)}>
          Retire it
        </Button>
      )}
      {trouble ? <Trouble title={trouble} /> : null}
    </Act>
  )
}
