'use client'

import Link from 'next/link'
import { useState } from 'react'
import { Acknowledge } from '@/components/notices/acknowledge'
import { evidenceLines } from '@/components/notices/evidence'
import { NoticeHistory } from '@/components/notices/notice-history'
import { isHot, NOTICE_MEANINGS, NOTICE_WORDS } from '@/components/notices/words'
import { useUnits } from '@/components/shell/units-context'
import { ago } from '@/components/time'
import type { Notice } from '@/shared/schemas'

/** One notice: what, on which boat, since when, why, and what was done about it. */
export function NoticeItem({
  notice,
  nowMs,
  offsetSeconds,
  showVessel,
  mayAcknowledge,
}: {
  notice: Notice
  nowMs: number
  offsetSeconds: number
  showVessel: boolean
  mayAcknowledge: boolean
}) {
  const { units } = useUnits()
  const [open, setOpen] = useState(false)
  const evidence = evidenceLines(notice.evidence, units.vacuum)
  const boat = notice.systemName ? `${notice.vesselName} · ${notice.systemName}` : notice.vesselName
  const standing = notice.closedAt === null
  return (
    <li className="border-b border-line py-4">
      <div className="flex flex-wrap items-baseline justify-between gap-x-6">
        <h3 className="text-lead">
          <span className={standing && isHot(notice.kind) ? 'text-attention' : ''}>
            {NOTICE_WORDS[notice.kind]}
          </span>
          {showVessel ? (
            <>
              {' · '}
              <Link href={`/vessels/${notice.vesselId}?system=${notice.systemId}`}>{boat}</Link>
            </>
          ) : null}
        </h3>
        <span className="datum">
          {standing
            ? `open since ${ago(notice.openedAt, nowMs)}`.replace(/^open since (.*) ago$/, 'open for $1')
            : ''}
          {notice.closedAt ? `ended ${ago(notice.closedAt, nowMs)}` : ''}
          {notice.heldSince ? ', held' : ''}
        </span>
      </div>
      <p className="mt-1 max-w-[52em]">{notice.reason}</p>
      {notice.acknowledgedAt ? (
        <p className="mt-1">
          Seen by {notice.acknowledgedBy ?? 'somebody'} {ago(notice.acknowledgedAt, nowMs)}
          {notice.acknowledgedNote ? `: “${notice.acknowledgedNote}”` : '.'}
        </p>
      ) : null}
      <details className="mt-2" onToggle={(event) => setOpen(event.currentTarget.open)}>
        <summary>Evidence, and who was told</summary>
        <p className="mt-2 text-ink-2">{`${NOTICE_WORDS[notice.kind]}: ${NOTICE_MEANINGS[notice.kind]}.`}</p>
        {evidence.length > 0 ? (
          <dl className="mt-2 grid max-w-[38em] grid-cols-[auto_1fr] gap-x-6 gap-y-1">
            {evidence.map((line) => (
              <div key={line.name} className="contents">
                <dt className="text-ink-2">{line.name}</dt>
                <dd className="figure">{line.value}</dd>
              </div>
            ))}
          </dl>
        ) : null}
        {open ? <NoticeHistory id={notice.id} offsetSeconds={offsetSeconds} nowMs={nowMs} /> : null}
      </details>
      {standing && mayAcknowledge ? <Acknowledge notice={notice} /> : null}
    </li>
  )
}
