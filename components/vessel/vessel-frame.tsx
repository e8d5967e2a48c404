'use client'

import Link from 'next/link'
import { notFound, usePathname } from 'next/navigation'
import type { ReactNode } from 'react'
import { useApi } from '@/components/data/use-api'
import { useNow } from '@/components/data/use-now'
import { useUnits } from '@/components/shell/units-context'
import { ago } from '@/components/time'
import { Loading, Trouble } from '@/components/ui/sheet-states'
import { TitleBlock } from '@/components/ui/title-block'
import { useVessel } from '@/components/vessel/use-vessel'
import { vesselTabs } from '@/components/vessel/tabs'
import type { List, System, Vessel } from '@/shared/schemas'

/** How far the logger's clock is off, whole seconds: "+2 s", "right". */
function clockWords(offsetSeconds: number): string {
  const seconds = Math.round(offsetSeconds)
  if (seconds === 0) return 'right'
  return `${seconds < 0 ? '−' : '+'}${Math.abs(seconds)} s`
}

const TAB =
  'inline-flex min-h-11 items-center border-b-2 border-transparent whitespace-nowrap text-ink-2 no-underline hover:text-ink aria-[current=page]:border-ink aria-[current=page]:font-semibold aria-[current=page]:text-ink'

function Count({ path }: { path: string }) {
  const { data } = useApi<List<unknown>>(path)
  return data && data.items.length > 0 ? <span className="figure ml-1.5">{data.items.length}</span> : null
}

function SystemChoice({ vessel, system, path }: { vessel: Vessel; system: System; path: string }) {
  if (vessel.systems.length < 2) return null
  return (
    <nav aria-label="Systems of this vessel" className="flex flex-wrap gap-4">
      {vessel.systems.map((other) => (
        <Link
          key={other.id}
          href={`${path}?system=${other.id}`}
          className={TAB}
          aria-current={other.id === system.id ? 'page' : undefined}
        >
          {other.name || 'Main system'}
        </Link>
      ))}
    </nav>
  )
}

/** Title block and tabs around whatever is read about a vessel. What one may not see does not exist. */
export function VesselFrame({ id, children }: { id: string; children: ReactNode }) {
  const path = usePathname()
  const now = useNow()
  const { units } = useUnits()
  const { vessel, system, error } = useVessel(id)
  if (error?.status === 404) notFound()
  if (!vessel) {
    return (
      <div className="sheet pt-7">
        {error ? <Trouble title={error.message} /> : <Loading what="the vessel" />}
      </div>
    )
  }
  const logger = system.logger
  const clockOff = logger?.clockOffsetSeconds ?? null
  const heard = logger?.lastHeardAt ? `Heard ${ago(logger.lastHeardAt, now)}` : 'Not heard yet'
  const aside = [
    [vessel.berth && `Berth ${vessel.berth}`, vessel.harbour, vessel.owner && `owner ${vessel.owner.name}`]
      .filter(Boolean)
      .join(' · '),
    clockOff === null ? heard : `${heard} · clock ${clockWords(clockOff)}`,
  ].filter((line) => line !== '')
  return (
    <>
      <TitleBlock
        title={
          <>
            {vessel.name}
            {system.name ? <span className="font-normal text-ink-2"> {system.name} system</span> : null}
          </>
        }
        datum={`Vacuum in ${units.vacuum} below ambient. Times as on board (${vessel.timeZone}). Quiet hours ${vessel.quietHours.start} to ${vessel.quietHours.end}.`}
        aside={aside}
      />
      <div className="sheet">
        <SystemChoice vessel={vessel} system={system} path={path} />
        <nav
          aria-label={`Sheets of ${vessel.name}`}
          className="flex gap-5 overflow-x-auto border-b border-line"
        >
          {vesselTabs(vessel.rights).map((tab) => {
            const href = tab.slug === '' ? `/vessels/${id}` : `/vessels/${id}/${tab.slug}`
            return (
              <Link
                key={tab.slug}
                href={`${href}?system=${system.id}`}
                aria-current={path === href ? 'page' : undefined}
                className={TAB}
              >
                {tab.word}
                {tab.slug === 'notices' ? (
                  <Count path={`/api/notices?state=open&system=${system.id}`} />
                ) : null}
                {tab.slug === 'visits' ? <Count path={`/api/visits?vessel=${id}`} /> : null}
              </Link>
            )
          })}
        </nav>
        {children}
      </div>
    </>
  )
}
