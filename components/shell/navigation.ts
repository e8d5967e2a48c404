import { worksForShop, type Viewer } from '@/components/shell/viewer'

export type NavigationItem = { href: string; word: string; counts?: 'open-notices' }

/**
 * Where each role may go, in its own words. A person with several roles gets each place once.
 * `demo` adds the outbox, where the messages that were sent can be read.
 */
export function navigationOf(viewer: Viewer | null, demo: boolean): NavigationItem[] {
  const items: NavigationItem[] = []
  if (viewer === null) items.push({ href: '/', word: 'What it does' })
  else {
    if (worksForShop(viewer)) items.push({ href: '/fleet', word: 'Fleet' })
    if (viewer.roles.includes('owner')) items.push({ href: '/tonight', word: 'Tonight' })
    items.push({ href: '/notices', word: 'Notices', counts: 'open-notices' })
    if (viewer.roles.some((role) => role === 'installer' || role === 'manager'))
      items.push({ href: '/loggers', word: 'Loggers' })
    if (viewer.roles.includes('manager'))
      items.push({ href: '/people', word: 'People' }, { href: '/shop', word: 'Shop' })
  }
  items.push({ href: '/calculators', word: 'Leak-down' })
  if (demo) items.push({ href: '/outbox', word: 'Outbox' })
  return items
}

/** Is the page at `path` the place `href`, or inside it? */
export function isCurrent(href: string, path: string): boolean {
  if (href === '/') return path === '/'
  if (href === '/fleet' && path.startsWith('/vessels')) return true
  if (href === '/loggers' && /^\/(register|claim)(\/|$)/.test(path)) return true
  return path === href || path.startsWith(`${href}/`)
}
