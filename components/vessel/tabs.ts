import type { Rights } from '@/shared/schemas'

export type VesselTab = {
  slug: '' | 'record' | 'pump' | 'notices' | 'visits' | 'set-up' | 'access'
  word: string
}

/** The sheets of a vessel. What the reader may not see is not offered. */
export function vesselTabs(rights: Rights): VesselTab[] {
  const tabs: VesselTab[] = [
    { slug: '', word: 'Now' },
    { slug: 'record', word: 'Record' },
  ]
  if (rights.fullRecord) tabs.push({ slug: 'pump', word: 'Pump' })
  tabs.push(
    { slug: 'notices', word: 'Notices' },
    { slug: 'visits', word: 'Visits' },
    { slug: 'set-up', word: 'Set-up' },
  )
  if (rights.giveAccess) tabs.push({ slug: 'access', word: 'Access' })
  return tabs
}
