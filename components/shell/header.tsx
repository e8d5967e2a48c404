import Link from 'next/link'
import { Mark } from '@/components/ui/mark'
import { navigationOf } from '@/components/shell/navigation'
import { NavigationLinks } from '@/components/shell/navigation-links'
import type { Theme } from '@/components/shell/preferences'
import { SignOut } from '@/components/shell/sign-out'
import { ThemeSelect } from '@/components/shell/theme-select'
import { UnitsSelect } from '@/components/shell/units-select'
import { homeOf, type Viewer } from '@/components/shell/viewer'

/** The bar over every sheet: the mark, where this reader may go, and how they want to read. */
export function Header({ viewer, theme, demo }: { viewer: Viewer | null; theme: Theme; demo: boolean }) {
  return (
    <header
      data-shell
      className="sheet flex flex-wrap items-center gap-x-7 border-b border-line py-1 sm:flex-nowrap"
    >
      <Link
        href={viewer ? homeOf(viewer) : '/'}
        className="inline-flex min-h-11 items-center gap-2 text-[1.125rem] font-bold tracking-[-0.01em] text-ink no-underline"
      >
        <Mark />
        Middlewatch
      </Link>
      <div className="order-last w-full min-w-0 sm:order-none sm:w-auto">
        <NavigationLinks items={navigationOf(viewer, demo)} />
      </div>
      <div className="ml-auto flex items-center gap-3 whitespace-nowrap">
        <span className="hidden items-center gap-3 sm:inline-flex">
          <UnitsSelect />
          <ThemeSelect initial={theme} />
        </span>
        {viewer ? (
          <>
            <Link
              href="/account"
              className="inline-flex min-h-11 max-w-40 items-center truncate text-ink-2 no-underline hover:text-ink hover:underline"
            >
              <span className="sr-only">Account of </span>
              <span className="truncate">{viewer.name}</span>
            </Link>
            <SignOut />
          </>
        ) : (
          <Link href="/sign-in" className="inline-flex min-h-11 items-center no-underline hover:underline">
            Sign in
          </Link>
        )}
      </div>
    </header>
  )
}
