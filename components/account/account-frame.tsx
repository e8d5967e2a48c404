'use client'

import Link from 'next/link'
import { usePathname } from 'next/navigation'
import type { ReactNode } from 'react'
import { useApi } from '@/components/data/use-api'
import { TitleBlock } from '@/components/ui/title-block'
import type { Me } from '@/shared/schemas'

const SHEETS = [
  { href: '/account', word: 'You' },
  { href: '/account/messages', word: 'Messages' },
  { href: '/account/aboard', word: 'Aboard and lay-up' },
  { href: '/account/security', word: 'Signing in' },
  { href: '/account/data', word: 'Your data' },
] as const

/** Title and sheets around whatever one sets for oneself. */
export function AccountFrame({ children }: { children: ReactNode }) {
  const path = usePathname()
  const { data: me } = useApi<Me>('/api/me')
  return (
    <>
      <TitleBlock title="Account" datum={me ? `${me.person.name}, ${me.person.email}` : ' '} />
      <div className="sheet">
        <nav aria-label="Sheets of the account" className="flex gap-5 overflow-x-auto border-b border-line">
          {SHEETS.filter((sheet) => sheet.href !== '/account/aboard' || (me?.ownVessels.length ?? 0) > 0).map(
            (sheet) => (
              <Link
                key={sheet.href}
                href={sheet.href}
                aria-current={path === sheet.href ? 'page' : undefined}
                className="inline-flex min-h-11 items-center border-b-2 border-transparent whitespace-nowrap text-ink-2 no-underline hover:text-ink aria-[current=page]:border-ink aria-[current=page]:font-semibold aria-[current=page]:text-ink"
              >
                {sheet.word}
              </Link>
            ),
          )}
        </nav>
        {children}
      </div>
    </>
  )
}
