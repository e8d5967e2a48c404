import type { Trx } from '@/db/roles'
import { faultsKnown, judgedSettings, recentConditions } from '@/db/queries/judged'
import { flushesKnown, holdsKnown, runsKnown } from '@/db/queries/record-rows'
import type { Figures } from '@/lib/analysis/figures'
import type { JudgedRecord } from '@/lib/notices/record'

const HOUR_MS = 3_600_000
const DAY_MS = 24 * HOUR_MS
/** A tight boat ends a hold by itself once a day at most, and three must be seen. */
const HOLD_DAYS = 7

/** Loads what notices of a system are judged by, as known now. */
export async function loadRecord(
  trx: Trx,
  systemId: string,
  figures: Figures,
  now: Date,
): Promise<JudgedRecord> {
  const atMs = now.getTime()
  const week = { atMs, fromMs: atMs - HOLD_DAYS * DAY_MS }
  const day = { atMs, fromMs: atMs - DAY_MS }
  return {
    now: atMs,
    figures,
    settings: await judgedSettings(trx, systemId, now),
    runs: await runsKnown(trx, systemId, week),
    holds: await holdsKnown(trx, systemId, week),
    flushes: await flushesKnown(trx, systemId, day),
    faults: await faultsKnown(trx, systemId, new Date(atMs - 2 * DAY_MS), now),
    ...(await recentConditions(trx, systemId, now)),
  }
}
