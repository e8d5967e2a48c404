'use client'

import { withQuery } from '@/components/data/request'
import { useApi } from '@/components/data/use-api'
import type { ZoneOffset } from '@/components/time'
import type { Outlook, QuietHours, Trace } from '@/shared/schemas'

const DAY_SECONDS = 86_400
const secondsOf = (wall: string): number => Number(wall.slice(0, 2)) * 3600 + Number(wall.slice(3, 5)) * 60

/**
 * Does the boat's clock change in this night? Told without any zone rule: by what its quiet hours' end reads
 * on a clock that runs at `offsetSeconds`. `clockChanges(…same offset at both ends…) // false`
 */
export function clockChanges(night: Outlook['night'], quiet: QuietHours, offsetSeconds: number): boolean {
  const reads = (instant: string) =>
    (((Date.parse(instant) / 1000 + offsetSeconds) % DAY_SECONDS) + DAY_SECONDS) % DAY_SECONDS
  return reads(night.from) !== secondsOf(quiet.start) || reads(night.to) !== secondsOf(quiet.end)
}

/** Offsets that hold for the coming night; the server's table is asked only in a night whose clock changes. */
export function useNightOffsets(
  systemId: string,
  outlook: Outlook | null,
  quiet: QuietHours,
  offsetSeconds: number,
): ZoneOffset[] {
  const changes = outlook !== null && clockChanges(outlook.night, quiet, offsetSeconds)
  const { data } = useApi<Trace>(
    changes
      ? withQuery(`/api/systems/${systemId}/trace`, {
          from: outlook.night.from,
          to: outlook.night.to,
          points: 1,
        })
      : null,
  )
  const now = { from: 0, seconds: offsetSeconds }
  return data ? [now, ...data.offsets] : [now]
}
