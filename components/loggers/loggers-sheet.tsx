'use client'

import { usePathname, useSearchParams } from 'next/navigation'
import { loggersFinding, PLACE_WORDS, PLACES, type LoggerPlace } from '@/components/loggers/health'
import { LoggersTable } from '@/components/loggers/loggers-table'
import { useLoggers } from '@/components/loggers/use-loggers'
import { Button, LinkButton } from '@/components/ui/button'
import { Empty, Loading, Trouble } from '@/components/ui/sheet-states'
import { TitleBlock } from '@/components/ui/title-block'

const CHIP =
  'inline-flex min-h-11 items-center gap-2 whitespace-nowrap rounded-sm border border-field px-2.5 aria-pressed:border-ink aria-pressed:font-semibold aria-pressed:inset-shadow-[0_-2px_0_var(--ink)]'

/** The loggers of the shop and its boats: those that want a look first. */
export function LoggersSheet() {
  const { views, error, now, refresh } = useLoggers()
  const path = usePathname()
  const query = useSearchParams()
  const chosen = PLACES.find((place) => place === query.get('show')) ?? null
  const find = (query.get('find') ?? '').toLowerCase()
  const change = (next: { show?: LoggerPlace | null; find?: string }) => {
    const search = new URLSearchParams(query)
    for (const [key, value] of Object.entries(next)) {
      if (value) search.set(key, value)
      else search.delete(key)
    }
    const text = search.toString()
    window.history.replaceState(null, '', text === '' ? path : `${path}?${text}`)
  }
  const shown = (views ?? []).filter(
    ({ logger, place }) =>
      (chosen === null ? place !== 'retired' : place === chosen) &&
      [logger.serial, logger.fitted?.vesselName, logger.fitted?.systemName].some((text) =>
        text?.toLowerCase().includes(find),
      ),
  )
  return (
    <>
      <TitleBlock
        title="Loggers"
        datum="Clock: how far ahead or behind when last heard. Supply: mean of the last hour heard, in volts."
      />
      <div className="sheet">
        {error && !views ? <Trouble title={error.message} retry={() => void refresh()} /> : null}
        {!views && !error ? <Loading what="the loggers" /> : null}
        {views && views.length === 0 ? (
          <Empty title="No logger is registered yet">
            <p className="mb-3">Power one, and go on with the code that it shows.</p>
            <LinkButton href="/register">Register a logger</LinkButton>
          </Empty>
        ) : null}
        {views && views.length > 0 ? (
          <>
            <p className="mb-4 max-w-[44em] text-finding tracking-[-0.015em]">{loggersFinding(views)}</p>
            <div className="no-print mb-5 flex flex-wrap items-center gap-2">
              {PLACES.map((place) => (
                <button
                  key={place}
                  type="button"
                  className={CHIP}
                  aria-pressed={chosen === place}
                  onClick={() => change({ show: chosen === place ? null : place })}
                >
                  {PLACE_WORDS[place]}
                  <span className="figure">{views.filter((view) => view.place === place).length}</span>
                </button>
              ))}
              <input
                type="search"
                aria-label="Find by serial or boat"
                placeholder="Serial or boat"
                defaultValue={query.get('find') ?? ''}
                onChange={(event) => change({ find: event.target.value })}
                className="min-h-11 min-w-0 flex-1 basis-40 rounded-sm border border-field bg-water px-3 placeholder:text-ink-2 sm:max-w-[16em]"
              />
              <span className="ml-auto">
                <LinkButton href="/register">Register a logger</LinkButton>
              </span>
            </div>
            {shown.length > 0 ? (
              <LoggersTable views={shown} nowMs={now} />
            ) : (
              <Empty title="No logger answers to that">
                <Button weight="plain" onClick={() => change({ show: null, find: '' })}>
                  Show all in use
                </Button>
              </Empty>
            )}
          </>
        ) : null}
      </div>
    </>
  )
}
