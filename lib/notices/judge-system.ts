import type { Trx } from '@/db/roles'
import { statementInForce, vesselOfSystem } from '@/db/queries/judged'
import { openNoticesOf, snoozedKinds, type OpenNotice } from '@/db/queries/notice-writes'
import { localMoments } from '@/db/queries/outlooks'
import type { Figures } from '@/lib/analysis/figures'
import { figuresAt } from '@/lib/figures'
import { tell } from '@/lib/messages/tell'
import { decide, decidePause, type Decision } from '@/lib/notices/decide'
import { explainedBy } from '@/lib/notices/group'
import { KINDS } from '@/lib/notices/kinds'
import { loadRecord } from '@/lib/notices/load-record'
import { mutedBy } from '@/lib/notices/mute'
import { JUDGED_KINDS, unclear, type Finding, type JudgedKind } from '@/lib/notices/record'
import { remember } from '@/lib/notices/remember'

/**
 * Judges what is to be told of a system after its record has changed, and queues the messages, in the caller's
 * transaction: state ▸ grouping ▸ muting ▸ memory ▸ sending.
 * @param figures as just computed, to save computing them again.
 * @returns one decision a kind, each with its reason by name.
 */
export async function judgeSystem(
  trx: Trx,
  systemId: string,
  now: Date,
  figures?: Figures | null,
): Promise<Decision[]> {
  const vessel = await vesselOfSystem(trx, systemId)
  const current = figures ?? (await figuresAt(trx, systemId, now.getTime()))
  if (vessel === null || current === null) return []
  const record = await loadRecord(trx, systemId, current, now)
  const findings = new Map<JudgedKind, Finding>(JUDGED_KINDS.map((kind) => [kind, KINDS[kind](record)]))
  const explained = explainedBy(findings)
  const statement = (await statementInForce(trx, systemId, now))?.value ?? null
  const situation = { unheard: current.state === 'unheard', statement }
  const standing = await openNoticesOf(trx, systemId)
  const snoozed = await snoozedKinds(trx, systemId, now)

  const decisions: Decision[] = []
  const eventIds: string[] = []
  for (const [kind, finding] of findings) {
    const notice = standing.find((open) => open.kind === kind) ?? null
    const decision = decide(kind, finding, notice, {
      muted: mutedBy(kind, situation),
      snoozed: snoozed.includes(kind),
      explainedBy: explained.get(kind) ?? null,
    })
    decisions.push(decision)
    const located = await withLocalTime(trx, vessel.timeZone, decision, finding)
    const eventId = await remember(trx, { systemId, ...vessel }, decision, located, notice, now)
    if (eventId !== null) eventIds.push(eventId)
  }
  await holdOthers(trx, standing, situation, now)
  await tell(trx, eventIds, now)
  return decisions
}

/** What opens or grows is told with the boat's own clock. */
async function withLocalTime(
  trx: Trx,
  timeZone: string,
  decision: Decision,
  finding: Finding,
): Promise<Finding> {
  const { sinceAt } = finding.evidence
  if (sinceAt == null || (decision.action !== 'open' && decision.action !== 'worsen')) return finding
  const [sinceLocal = null] = await localMoments(trx, timeZone, [new Date(sinceAt)])
  return { ...finding, evidence: { ...finding.evidence, sinceLocal } }
}

/** Notices of the hour and the evening pause and go on with the rest. */
async function holdOthers(
  trx: Trx,
  standing: OpenNotice[],
  situation: Parameters<typeof mutedBy>[1],
  now: Date,
): Promise<void> {
  for (const notice of standing.filter((open) => open.kind === 'step' || open.kind === 'night-warning')) {
    const decision = decidePause(notice, mutedBy(notice.kind, situation))
    await remember(trx, notice, decision, unclear, notice, now)
  }
}
