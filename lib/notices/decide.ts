import type { OpenNotice } from '@/db/queries/notice-writes'
import type { MuteReason } from '@/lib/notices/mute'
import type { Finding, JudgedKind } from '@/lib/notices/record'
import type { NoticeKind } from '@/shared/schemas/words'

export type DecisionReason =
  | 'found'
  | 'grown-by-half'
  | 'over'
  | 'paused'
  | 'heard-again'
  | 'stands'
  | 'nothing-found'
  | 'snoozed'
  | 'explained-by-another'
  | 'still-paused'

export interface Decision {
  kind: NoticeKind
  action: 'open' | 'worsen' | 'end' | 'hold' | 'resume' | 'none'
  reason: DecisionReason
  /** Where another notice or a pause explains it. */
  because: JudgedKind | MuteReason | null
}

const WORSE_BY = 1.5

/**
 * What becomes of one kind of notice, with the reason by name. Pure. What is paused neither opens, grows nor ends;
 * what is snoozed is not told, but may end.
 */
export function decide(
  kind: JudgedKind,
  finding: Finding,
  standing: OpenNotice | null,
  situation: { muted: MuteReason | null; snoozed: boolean; explainedBy: JudgedKind | null },
): Decision {
  const answer = (
    action: Decision['action'],
    reason: DecisionReason,
    because: Decision['because'] = null,
  ) => ({
    kind,
    action,
    reason,
    because,
  })
  const { muted, snoozed, explainedBy } = situation
  if (standing === null) {
    if (finding.is !== 'present') return answer('none', 'nothing-found')
    if (muted !== null) return answer('none', 'still-paused', muted)
    if (explainedBy !== null) return answer('none', 'explained-by-another', explainedBy)
    return snoozed ? answer('none', 'snoozed') : answer('open', 'found')
  }
  const pause = decidePause(standing, muted)
  if (muted !== null || pause.action !== 'none') return pause
  if (finding.is === 'absent') return answer('end', 'over')
  const grown = finding.is === 'present' && finding.severity >= WORSE_BY * standing.severity
  if (!grown) return answer('none', 'stands')
  return snoozed ? answer('none', 'snoozed') : answer('worsen', 'grown-by-half')
}

/** What a pause, its going on or its end makes of a standing notice of any kind. */
export function decidePause(standing: OpenNotice, muted: MuteReason | null): Decision {
  const answer = { kind: standing.kind, because: muted }
  if (muted !== null) {
    return standing.heldSince === null
      ? { ...answer, action: 'hold', reason: 'paused' }
      : { ...answer, action: 'none', reason: 'still-paused' }
  }
  return standing.heldSince === null
    ? { ...answer, action: 'none', reason: 'stands' }
    : { ...answer, action: 'resume', reason: 'heard-again' }
}
