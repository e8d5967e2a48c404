'use client'

import Link from 'next/link'
import { usePathname } from 'next/navigation'
import { useApi } from '@/components/data/use-api'
import { isCurrent, type NavigationItem } from '@/components/shell/navigation'
import type { List } from '@/shared/schemas'

function OpenNotices() {
  const { data } = useApi<List<{ id: string }>>('/api/notices?state=open', { refreshMs: 60_000 })
  const count = data?.items.length ?? 0
  if (count === 0) return null
  return (
    <span className="figure ml-1.5">
      {count}
      <span className="sr-only"> open</span>
    </span>
  )
}

/** The places of this reader; the one they are in is underlined and said. */
export function NavigationLinks({ items }: { items: readonly NavigationItem[] }) {
  const path = usePathname()
  return (
    <nav aria-label="Main" className="-mx-2 flex gap-1 overflow-x-auto sm:gap-3">
      {items.map((item) => {
        const current = isCurrent(item.href, path)
        return (
          <Link
            key={item.href}
            href={item.href}
            aria-current={current ? 'page' : undefined}
            className={`inline-flex min-h-11 items-center border-y-2 border-transparent px-2 whitespace-nowrap no-underline ${
              current ? 'border-b-ink! text-ink' : 'text-ink-2 hover:text-ink'
            }`}
          >
            {item.word}
            {item.counts ? <OpenNotices /> : null}
          </Link>
        )
      })}
    </nav>
  )
}
