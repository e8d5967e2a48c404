'use client'

import { usePathname, useSearchParams } from 'next/navigation'
import { useApi } from '@/components/data/use-api'
import { useNow } from '@/components/data/use-now'
import { NoticeItem } from '@/components/notices/notice-item'
import { noticesFinding } from '@/components/notices/finding'
import { Empty, Loading, Trouble } from '@/components/ui/sheet-states'
import { TitleBlock } from '@/components/ui/title-block'
import type { FleetRow, List, Notice } from '@/shared/schemas'

const CHOICE =
  'min-h-11 rounded-sm border border-field px-3 sm:min-h-9 aria-pressed:border-ink aria-pressed:font-semibold aria-pressed:inset-shadow-[0_-2px_0_var(--ink)]'

/** Every notice the reader may see; the open ones first, the newest on top. */
export function NoticesSheet() {
  const now = useNow()
  const path = usePathname()
  const state = useSearchParams().get('state') === 'closed' ? 'closed' : 'open'
  const { data, error, mutate } = useApi<List<Notice>>(`/api/notices?state=${state}&limit=1000`, {
    refreshMs: 60_000,
  })
  const rows = useApi<List<FleetRow>>('/api/vessels?limit=5000').data?.items
  const offsets = new Map(rows?.map((row) => [row.vesselId, row.utcOffsetSeconds]))
  const items = [...(data?.items ?? [])].sort((a, b) => Date.parse(b.openedAt) - Date.parse(a.openedAt))
  return (
    <>
      <TitleBlock
        title="Notices"
        datum="One open notice a system and kind; each ends by itself when its cause does."
      />
      <div className="sheet">
        {data && state === 'open' ? (
          <p className="mb-4 max-w-[44em] text-finding tracking-[-0.015em]">{noticesFinding(items)}</p>
        ) : null}
        <div className="no-print mb-2 flex gap-2">
          {(['open', 'closed'] as const).map((choice) => (
            <button
              key={choice}
              type="button"
              className={CHOICE}
              aria-pressed={state === choice}
              onClick={() =>
                window.history.replaceState(null, '', choice === 'open' ? path : `${path}?state=closed`)
              }
            >
              {choice === 'open' ? 'Open' : 'Ended'}
            </button>
          ))}
        </div>
        {error ? <Trouble title={error.message} retry={() => void mutate()} /> : null}
        {!data && !error ? <Loading what="the notices" /> : null}
        {data && items.length === 0 ? (
          <Empty title={state === 'open' ? 'Nothing stands open' : 'Nothing has ended yet'}>
            {state === 'open'
              ? 'When something wants attention it is told by message and stands here.'
              : null}
          </Empty>
        ) : null}
        <ul className="border-t-[1.5px] border-ink empty:hidden">
          {items.map((notice) => (
            <NoticeItem
              key={notice.id}
              notice={notice}
              nowMs={now}
              offsetSeconds={offsets.get(notice.vesselId) ?? 0}
              showVessel
              mayAcknowledge
            />
          ))}
        </ul>
      </div>
    </>
  )
}
