import type { Trx } from '@/db/roles'
import {
  addEvent,
  closeNotice,
  openNotice,
  setHeld,
  worsenNotice,
  type OpenNotice,
} from '@/db/queries/notice-writes'
import type { Decision } from '@/lib/notices/decide'
import { MUTE_WORDS, type MuteReason } from '@/lib/notices/mute'
import type { Finding } from '@/lib/notices/record'

/**
 * Writes a decision down.
 * @returns the event to be told, or null where there is nothing to tell.
 */
export async function remember(
  trx: Trx,
  system: { systemId: string; vesselId: string },
  decision: Decision,
  finding: Finding,
  standing: OpenNotice | null,
  now: Date,
): Promise<string | null> {
  const said = { at: now, reason: finding.reason, evidence: finding.evidence }
  if (decision.action === 'open') {
    const opened = await openNotice(trx, {
      ...system,
      ...said,
      kind: decision.kind,
      severity: finding.severity,
    })
    return opened?.eventId ?? null
  }
  if (standing === null) return null
  switch (decision.action) {
    case 'worsen':
      await worsenNotice(trx, standing.id, finding)
      return addEvent(trx, standing.id, 'worsened', said)
    case 'end':
      await closeNotice(trx, standing.id, now)
      return addEvent(trx, standing.id, 'ended', { at: now, reason: 'It is over, with a margin' })
    case 'hold':
      await setHeld(trx, standing.id, now)
      await addEvent(trx, standing.id, 'held', { at: now, reason: pauseWords(decision.because) })
      return null
    case 'resume':
      await setHeld(trx, standing.id, null)
      await addEvent(trx, standing.id, 'resumed', { at: now, reason: 'It is heard and in use again' })
      return null
    case 'none':
      return null
  }
}

const pauseWords = (because: Decision['because']): string =>
  because !== null && because in MUTE_WORDS ? MUTE_WORDS[because as MuteReason] : 'Paused'
