import type { Trx } from '@/db/roles'
import {
  givenOutlooks,
  lastNightWarning,
  systemsHeardSince,
  writeOutlook,
  type GivenOutlook,
  type NightCandidate,
} from '@/db/queries/outlooks'
import { closeNotice, openNotice, openNoticesOf, snoozedKinds } from '@/db/queries/notice-writes'
import { recipientsOf } from '@/db/queries/recipients'
import { nightWindows, type NightWindow } from '@/db/queries/zones'
import { warns, type Outlook, type WarningDecision } from '@/lib/analysis/outlook'
import { log } from '@/lib/log'
import { lowestNightChance } from '@/lib/messages/choose-addresses'
import { tell } from '@/lib/messages/tell'
import { outlookAt } from '@/lib/outlook/outlook-at'
import { statementInForce } from '@/db/queries/judged'
import { nightEvidence } from '@/lib/ticks/night-evidence'
import type { Tick } from '@/lib/ticks/run-tick'

const HOUR_MS = 3_600_000
/** Long enough before quiet hours to fetch a cup of water. */
const LEAD_MS = 2 * HOUR_MS
/** An owner's other boats are looked at in the same breath, so that one message tells of all of them. */
const TOGETHER_MS = 3 * HOUR_MS
/** A first flush after "away" may still send until an hour into quiet hours: 23:00 where they begin at 22:00. */
const LATEST_MS = HOUR_MS
const FRESH_MS = 2 * HOUR_MS
/** So many systems a transaction; the rest follow in the next one. */
const BATCH = 200

/** What may turn out otherwise when more is heard the same evening. */
const OPEN_REASONS = ['nobody-aboard', 'stale-data', 'learning']

interface Due extends NightCandidate {
  window: NightWindow
}

/** Says of each system, once an evening, what the night will bring, and warns where it must. */
export const nightTick: Tick = { name: 'night', role: 'service', work: giveNights }

export async function giveNights(trx: Trx, now: Date): Promise<Record<string, number>> {
  const due = await dueTonight(trx, now)
  const eventIds: string[] = []
  let failed = 0
  for (const system of due.slice(0, BATCH)) {
    try {
      // A savepoint each: one system that cannot be computed must not silence the others.
      const eventId = await trx.transaction((inner) => giveNight(inner, system, now))
      if (eventId !== null) eventIds.push(eventId)
    } catch (error) {
      failed += 1
      log.error({ systemId: system.systemId, error: String(error) }, 'no outlook for this system')
    }
  }
  await tell(trx, eventIds, now)
  const given = Math.min(due.length, BATCH) - failed
  return {
    given,
    warned: eventIds.length,
    failed,
    // Where none could be computed, asking again at once would end the same.
    left: given > 0 ? Math.max(0, due.length - BATCH) : 0,
  }
}

async function dueTonight(trx: Trx, now: Date): Promise<Due[]> {
  const candidates = await systemsHeardSince(trx, new Date(now.getTime() - FRESH_MS))
  const windows = await nightWindows(trx, [...new Set(candidates.map((one) => one.vesselId))], now)
  const byVessel = new Map(windows.map((window) => [window.vesselId, window]))
  const soon = candidates.flatMap((candidate) => {
    const window = byVessel.get(candidate.vesselId)
    return window !== undefined && isEvening(window, now, TOGETHER_MS) ? [{ ...candidate, window }] : []
  })
  const given = await givenOutlooks(
    trx,
    soon.map(({ systemId, window }) => ({ systemId, night: window.night })),
  )
  const open = soon.filter((system) =>
    isOpen(
      given.find((one) => one.systemId === system.systemId),
      now,
    ),
  )
  const begun = open.filter(({ window }) => isEvening(window, now, LEAD_MS))
  const owners = new Set(begun.flatMap((system) => system.ownerIds))
  return open.filter(
    (system) => begun.includes(system) || system.ownerIds.some((ownerId) => owners.has(ownerId)),
  )
}

const isEvening = (window: NightWindow, now: Date, leadMs: number): boolean =>
  now.getTime() >= window.from.getTime() - leadMs && now.getTime() < window.from.getTime() + LATEST_MS

/**
 * Nothing said yet, or only for want of something that may still be heard: readings that arrive at this moment are
 * waited for from minute to minute, people from five to five.
 */
function isOpen(given: GivenOutlook | undefined, now: Date): boolean {
  if (given === undefined || given.reason === 'provisional') return true
  const pauseMs = given.reason === 'nobody-aboard' ? 5 * 60_000 : 45_000
  return OPEN_REASONS.includes(given.reason) && now.getTime() - given.givenAt.getTime() >= pauseMs
}

/** @returns the event to be told, or null. */
async function giveNight(trx: Trx, system: Due, now: Date): Promise<string | null> {
  const outlook = await outlookAt(trx, system.systemId, now)
  if (outlook === null) return null
  const decision = await decide(trx, system, outlook, now)
  await writeOutlook(trx, {
    systemId: system.systemId,
    night: system.window.night,
    givenAt: now,
    quietFrom: system.window.from,
    quietTo: system.window.to,
    chance: outlook.chance,
    chanceIfFlushedLast: outlook.chanceIfFlushedLast,
    expectedRuns: outlook.expectedRuns,
    aboard: outlook.aboard,
    detail: { ...outlook, reason: decision.reason },
  })
  return decision.warn ? warn(trx, system, outlook, decision, now) : null
}

async function decide(trx: Trx, system: Due, outlook: Outlook, now: Date): Promise<WarningDecision> {
  const [statement, lastWarning, snoozed, people] = [
    await statementInForce(trx, system.systemId, now),
    await lastNightWarning(trx, system.systemId),
    await snoozedKinds(trx, system.systemId, now),
    await recipientsOf(trx, system.vesselId),
  ]
  return warns(outlook, {
    threshold: lowestNightChance(people),
    expected: statement === null && !snoozed.includes('night-warning'),
    lastWarning:
      lastWarning === null ? null : { at: lastWarning.at.getTime(), expectedRuns: lastWarning.expectedRuns },
    latestAt: system.window.from.getTime() + LATEST_MS,
  })
}

async function warn(
  trx: Trx,
  system: Due,
  outlook: Outlook,
  decision: WarningDecision,
  now: Date,
): Promise<string | null> {
  const standing = await openNoticesOf(trx, system.systemId)
  for (const old of standing.filter(
    (one) => one.kind === 'night-warning' && one.night !== system.window.night,
  )) {
    await closeNotice(trx, old.id, now)
  }
  const evidence = await nightEvidence(trx, system.timeZone, outlook)
  const opened = await openNotice(trx, {
    systemId: system.systemId,
    vesselId: system.vesselId,
    kind: 'night-warning',
    night: system.window.night,
    at: now,
    severity: outlook.chanceIfFlushedLast ?? 0,
    reason: REASONS[decision.reason] ?? decision.reason,
    evidence,
  })
  return opened?.eventId ?? null
}

const REASONS: Partial<Record<WarningDecision['reason'], string>> = {
  'likely-even-if-flushed-last': 'A run in quiet hours is likely even if somebody flushes last thing',
  'grown-by-half': 'Half as many runs again are to be expected as when this was last told',
  'seven-days-since': 'Still likely, and last told more than seven days ago',
}
