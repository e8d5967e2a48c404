'use client'

import Link from 'next/link'
import { memo } from 'react'
import { HoldLines, HoldMark } from '@/components/charts/hold-scale'
import { NightRow, stripWords } from '@/components/charts/night-strip'
import { movingWords, rowName, tonightWords } from '@/components/fleet/fleet-words'
import { holdWords } from '@/components/figures'
import type { FleetRow } from '@/shared/schemas'
import { drawnOn, finishedNights, withSilence } from '@/components/nights'
import { NOTICE_WORDS } from '@/components/notices/words'
import { isTroubled } from '@/components/states'
import { dayAndClock, dayOfDate, span } from '@/components/time'
import { StateLabel } from '@/components/ui/state-mark'
import type { Night } from '@/shared/schemas'

/** One grid for the head and every row: a phone stacks it, a desk lays it out, both from the same cells. */
export const FLEET_GRID =
  'grid grid-cols-2 gap-x-3 lg:grid-cols-[minmax(9.5rem,1.25fr)_9.6rem_minmax(13rem,2fr)_minmax(6.5rem,1fr)_minmax(6.5rem,1fr)_minmax(15rem,2.4fr)_3.6rem_minmax(7.5rem,1.15fr)] lg:gap-x-4'

function nightsLabel(nights: readonly Night[]): string {
  return nights.map((night) => `${dayOfDate(night.date)}: ${stripWords(night)}`).join('. ')
}

type Props = {
  row: FleetRow
  index: number
  nights: readonly Night[] | undefined
  nowMs: number
  current: boolean
}

/** One system of the fleet. The hold cell has no padding above or below, so that the lines join through the column. */
export const FleetRowCells = memo(function FleetRowCells({ row, index, nights, nowMs, current }: Props) {
  const berth = [row.berth, row.harbour].filter(Boolean).join(', ')
  const calm = !isTroubled(row.state)
  const tonight = tonightWords(row)
  const over = finishedNights(nights ?? [], row.utcOffsetSeconds, nowMs).map((night) =>
    withSilence(drawnOn(night), row.lastHeardAt, row.utcOffsetSeconds),
  )
  return (
    <div
      role="row"
      aria-rowindex={index + 2}
      className={`${FLEET_GRID} border-b border-line py-3 lg:min-h-[4.25rem] lg:items-center lg:py-0`}
    >
      <div role="cell">
        <Link
          href={`/vessels/${row.vesselId}?system=${row.systemId}`}
          prefetch={false}
          data-fleet-link={index}
          tabIndex={current ? 0 : -1}
          className="inline-block py-1 font-bold text-ink no-underline hover:underline"
        >
          {rowName(row)}
        </Link>
        <span className="datum block">{berth}</span>
      </div>
      <div role="cell" className="justify-self-end text-right lg:justify-self-auto lg:text-left">
        <StateLabel state={row.state} />
        <span className="datum block whitespace-nowrap">{row.holdTime ? holdWords(row.holdTime) : ''}</span>
      </div>
      <div role="cell" className="relative col-span-2 my-2 h-7 self-stretch lg:col-span-1 lg:my-0 lg:h-auto">
        <HoldLines limitSeconds={row.limitSeconds} aimSeconds={row.aimSeconds} />
        {row.holdTime ? <HoldMark holdTime={row.holdTime} state={row.state} /> : null}
      </div>
      <div role="cell" className="lg:py-2">
        {movingWords(row, nowMs)}
      </div>
      <div role="cell" className="justify-self-end text-right lg:justify-self-auto lg:py-2 lg:text-left">
        {tonight}
        {row.aboard === 'aboard' ? <span className="datum block">aboard now</span> : null}
      </div>
      <div role="cell" className="col-span-2 my-2 min-h-5 lg:col-span-1 lg:my-0">
        {over.length > 0 ? <NightRow nights={over} calm={calm} label={nightsLabel(over)} /> : null}
      </div>
      <div role="cell" className="figure whitespace-nowrap">
        <span className="lg:hidden">heard </span>
        {row.lastHeardAt ? span((nowMs - Date.parse(row.lastHeardAt)) / 1000) : 'never'}
      </div>
      <div role="cell" className="justify-self-end text-right lg:justify-self-auto lg:py-2 lg:text-left">
        {row.openNotices.map((kind) => NOTICE_WORDS[kind]).join(', ')}
        {row.nextVisitAt ? (
          <span className="datum block">
            visit {dayAndClock(row.nextVisitAt, row.utcOffsetSeconds, nowMs)}
          </span>
        ) : null}
      </div>
    </div>
  )
})
