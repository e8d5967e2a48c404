'use client'

import { useApi } from '@/components/data/use-api'
import { useNow } from '@/components/data/use-now'
import { NoticeItem } from '@/components/notices/notice-item'
import { Empty, Loading, Trouble } from '@/components/ui/sheet-states'
import { useVessel } from '@/components/vessel/use-vessel'
import type { List, Notice } from '@/shared/schemas'

/** The notices of one system: what stands open, then what has been. */
export function NoticesTab({ id }: { id: string }) {
  const now = useNow()
  const { vessel, system } = useVessel(id)
  const path = system ? `/api/notices?system=${system.id}&limit=1000` : null
  const { data, error, mutate } = useApi<List<Notice>>(path, { refreshMs: 60_000 })
  if (!vessel || !system) return null
  if (error) return <Trouble title={error.message} retry={() => void mutate()} />
  if (!data) return <Loading what="the notices" />
  if (data.items.length === 0)
    return (
      <Empty title="No notice has been opened for this system">
        When one is, it stands here with its evidence.
      </Empty>
    )
  const standing = (notice: Notice) => (notice.closedAt === null ? 0 : 1)
  const items = [...data.items].sort(
    (a, b) => standing(a) - standing(b) || Date.parse(b.openedAt) - Date.parse(a.openedAt),
  )
  return (
    <ul className="mt-3">
      {items.map((notice) => (
        <NoticeItem
          key={notice.id}
          notice={notice}
          nowMs={now}
          offsetSeconds={vessel.utcOffsetSeconds}
          showVessel={false}
          mayAcknowledge={vessel.rights.acknowledge}
        />
      ))}
    </ul>
  )
}
