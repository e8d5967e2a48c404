'use client'

import Link from 'next/link'
import { useState } from 'react'
import { Acknowledge } from '@/components/notices/acknowledge'
import { EvidenceChart } from '@/components/notices/evidence-chart'
import { evidenceLines } from '@/components/notices/evidence'
import { NoticeHistory } from '@/components/notices/notice-history'
import { isHot, NOTICE_MEANINGS, NOTICE_WORDS } from '@/components/notices/words'
import { useUnits } from '@/components/shell/units-context'
import { ago, span } from '@/components/time'
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
  const [open, setOpen] = useState(false)
  const boat = notice.systemName ? `${notice.vesselName} · ${notice.systemName}` : notice.vesselName
  const standing = notice.closedAt === null
  return (
    <li className="grid gap-x-10 border-b border-line py-4 lg:grid-cols-[minmax(0,1fr)_auto]">
      <div>
        <h2>
          <span className={standing && isHot(notice.kind) ? 'text-attention' : ''}>
            {NOTICE_WORDS[notice.kind]}
          </span>
          {showVessel ? (
            <>
              {' · '}
              <Link href={`/vessels/${notice.vesselId}?system=${notice.systemId}`}>{boat}</Link>
            </>
          ) : null}
          <span className="datum ml-3 font-normal">{noticeAge(notice, nowMs)}</span>
        </h2>
        <p className="mt-0.5 max-w-[52em]">{notice.reason}</p>
        {notice.acknowledgedAt ? (
          <p className="mt-1">
            Seen by {notice.acknowledgedBy ?? 'somebody'} {ago(notice.acknowledgedAt, nowMs)}
            {notice.acknowledgedNote ? `: “${notice.acknowledgedNote}”` : '.'}
          </p>
        ) : null}
        <details className="mt-1.5" onToggle={(event) => setOpen(event.currentTarget.open)}>
          <summary className="py-0.5">Evidence, and who was told</summary>
          <p className="mt-2 text-ink-2">{`${NOTICE_WORDS[notice.kind]}: ${NOTICE_MEANINGS[notice.kind]}.`}</p>
          <EvidenceChart notice={notice} />
          <EvidenceList evidence={notice.evidence} />
          {open ? <NoticeHistory id={notice.id} offsetSeconds={offsetSeconds} nowMs={nowMs} /> : null}
        </details>
      </div>
      {standing && mayAcknowledge ? <Acknowledge notice={notice} /> : null}
    </li>
  )
}

function EvidenceList({ evidence }: { evidence: Notice['evidence'] }) {
  const { units } = useUnits()
  const lines = evidenceLines(evidence, units.vacuum)
  if (lines.length === 0) return null
  return (
    <dl className="mt-3 grid max-w-[38em] grid-cols-[auto_1fr] gap-x-6 gap-y-1">
      {lines.map((line) => (
        <div key={line.name} className="contents">
          <dt className="text-ink-2">{line.name}</dt>
          <dd className="figure">{line.value}</dd>
        </div>
      ))}
    </dl>
  )
}

/** "open for 11 h", "ended 2 h ago", and whether it is held back. */
function noticeAge(notice: Notice, nowMs: number): string {
  if (notice.closedAt !== null) return `ended ${ago(notice.closedAt, nowMs)}`
  const open = `open for ${span((nowMs - Date.parse(notice.openedAt)) / 1000)}`
  return notice.heldSince === null ? open : `${open}, held back`
}
