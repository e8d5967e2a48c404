'use client'

import { useApi } from '@/components/data/use-api'
import type { FleetRow } from '@/shared/schemas'
import type { Night, Nights } from '@/shared/schemas'

const CHUNK = 32
const REFRESH_MS = 5 * 60_000

function useChunk(rows: readonly FleetRow[], index: number) {
  const ids = rows.slice(index * CHUNK, (index + 1) * CHUNK).map((row) => row.systemId)
  return useApi<Nights>(ids.length > 0 ? `/api/nights?systems=${ids.join(',')}&nights=8` : null, {
    refreshMs: REFRESH_MS,
  }).data
}

/**
 * The last nights, the one to come with them, of the rows between two indexes, and of nobody else: three stretches of 32 rows cover
 * any screen, and each stretch is asked for once however the reader scrolls.
 */
export function useNightsInView(rows: readonly FleetRow[], first: number): Map<string, Night[]> {
  const at = Math.floor(Math.max(0, first) / CHUNK)
  const stretches = [useChunk(rows, at), useChunk(rows, at + 1), useChunk(rows, at + 2)]
  const nights = new Map<string, Night[]>()
  for (const stretch of stretches)
    for (const item of stretch?.items ?? []) nights.set(item.systemId, item.nights)
  return nights
}
