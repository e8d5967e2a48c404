'use client'

import { withQuery } from '@/components/data/request'
import { useApi } from '@/components/data/use-api'
import type { Nights, Outlook, Summary, Trend } from '@/shared/schemas'

const MINUTE_MS = 60_000
const DAY_MS = 86_400_000

export const useSummary = (systemId: string | undefined) =>
  useApi<Summary>(systemId ? `/api/systems/${systemId}/summary` : null, { refreshMs: MINUTE_MS / 2 })

export const useOutlook = (systemId: string | undefined) =>
  useApi<Outlook>(systemId ? `/api/systems/${systemId}/outlook` : null, { refreshMs: MINUTE_MS })

export const useNights = (systemId: string | undefined, nights: number) =>
  useApi<Nights>(systemId ? `/api/nights?systems=${systemId}&nights=${nights}` : null, {
    refreshMs: 5 * MINUTE_MS,
  })

/** The trend of the last 90 days, counted from a whole day so that the address stays the same until tomorrow. */
export function useTrend(systemId: string | undefined, nowMs: number) {
  const from = new Date((Math.floor(nowMs / DAY_MS) - 90) * DAY_MS).toISOString()
  return useApi<Trend>(systemId ? withQuery(`/api/systems/${systemId}/trend`, { from }) : null)
}
