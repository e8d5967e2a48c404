import type { Trx } from '@/db/roles'
import { localMoments } from '@/db/queries/outlooks'
import { addEvent, closeNotice, openNotice, openNoticesOf, setHeld } from '@/db/queries/notice-writes'
import { openSilences, silentSystems, type SilentSystem } from '@/db/queries/silence'
import { ownersToldOf } from '@/db/queries/told'
import { tell } from '@/lib/messages/tell'
import { groupSilence, type SilenceToTell } from '@/lib/notices/group-silence'
import type { Tick } from '@/lib/ticks/run-tick'

/** After a day the owner hears of it as well. */
const OWNER_AFTER_MS = 24 * 3_600_000

/** Notices loggers that fell silent, holds what follows from the silence, and ends the notice when they are heard. */
export const silenceTick: Tick = { name: 'silence', role: 'service', work: watchSilence }

export async function watchSilence(trx: Trx, now: Date): Promise<Record<string, number>> {
  const ended = await endHeard(trx, now)
  const silent = await silentSystems(trx, now)
  const opened: string[] = []
  for (const news of groupSilence(silent)) {
    const eventId = await openSilence(trx, news, now)
    if (eventId !== null) opened.push(eventId)
  }
  const owners = await tellOwners(trx, silent, now)
  await tell(trx, [...ended, ...opened, ...owners], now)
  return { opened: opened.length, ended: ended.length, owners: owners.length }
}

async function openSilence(trx: Trx, news: SilenceToTell, now: Date): Promise<string | null> {
  const { first, systems } = news
  const [since = ''] = await localMoments(trx, first.timeZone, [first.lastHeardAt])
  const isNetwork = news.reason === 'harbour-network'
  const opened = await openNotice(trx, {
    systemId: first.systemId,
    vesselId: first.vesselId,
    kind: 'logger-silent',
    at: now,
    severity: systems.length,
    reason: isNetwork
      ? `Nothing heard from ${systems.length} loggers in ${first.harbour} since about ${since}: probably its network`
      : `Nothing heard from the logger since ${since}`,
    evidence: {
      sinceLocal: since,
      lastHeardAt: first.lastHeardAt.toISOString(),
      // Ids alone: whoever may see this boat need not know the others by name.
      ...(isNetwork
        ? {
            harbour: first.harbour,
            loggers: systems.length,
            systemIds: systems.map((system) => system.systemId),
          }
        : {}),
    },
  })
  for (const system of systems) await holdOthers(trx, system.systemId, now)
  return opened?.eventId ?? null
}

/** What was found before stays found, and neither grows nor ends while nothing is heard. */
async function holdOthers(trx: Trx, systemId: string, now: Date): Promise<void> {
  for (const notice of await openNoticesOf(trx, systemId)) {
    if (notice.kind === 'logger-silent' || notice.heldSince !== null) continue
    await setHeld(trx, notice.id, now)
    await addEvent(trx, notice.id, 'held', { at: now, reason: 'Nothing is heard from the logger' })
  }
}

async function endHeard(trx: Trx, now: Date): Promise<string[]> {
  const eventIds: string[] = []
  for (const silence of await openSilences(trx, now)) {
    if (!silence.heardAgain) continue
    await closeNotice(trx, silence.noticeId, now)
    eventIds.push(
      await addEvent(trx, silence.noticeId, 'ended', { at: now, reason: 'The logger is heard again' }),
    )
  }
  return eventIds
}

/** A day of silence is the owner's news too, of each boat by itself, also where one notice stands for a harbour. */
async function tellOwners(trx: Trx, silent: SilentSystem[], now: Date): Promise<string[]> {
  const long = silent.filter((system) => now.getTime() - system.lastHeardAt.getTime() >= OWNER_AFTER_MS)
  const eventIds: string[] = []
  for (const system of long) {
    if (system.noticeId !== null && (await ownersToldOf(trx, system.noticeId))) continue
    const [since = ''] = await localMoments(trx, system.timeZone, [system.lastHeardAt])
    const evidence = { sinceLocal: since, audience: 'owner' }
    const reason = `Nothing heard from the logger for a day, since ${since}`
    if (system.noticeId !== null) {
      eventIds.push(await addEvent(trx, system.noticeId, 'worsened', { at: now, reason, evidence }))
    } else {
      const opened = await openNotice(trx, {
        systemId: system.systemId,
        vesselId: system.vesselId,
        kind: 'logger-silent',
        at: now,
        severity: 1,
        reason,
        evidence,
      })
      if (opened !== null) eventIds.push(opened.eventId)
    }
  }
  return eventIds
}
