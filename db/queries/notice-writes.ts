import type { Trx } from '@/db/roles'
import type { NoticeKind } from '@/shared/schemas/words'
import type { Transition } from '@/db/queries/notice-events'

/** A notice that stands, as judging needs it. */
export interface OpenNotice {
  id: string
  systemId: string
  vesselId: string
  kind: NoticeKind
  openedAt: Date
  heldSince: Date | null
  severity: number
  evidence: Record<string, unknown>
  night: string | null
  acknowledgedAt: Date | null
  snoozedUntil: Date | null
}

interface NoticeRow {
  id: string
  system_id: string
  vessel_id: string
  kind: NoticeKind
  opened_at: Date
  held_since: Date | null
  severity: number
  evidence: Record<string, unknown>
  night: string | null
  acknowledged_at: Date | null
  snoozed_until: Date | null
}

const toNotice = (row: NoticeRow): OpenNotice => ({
  id: String(row.id),
  systemId: String(row.system_id),
  vesselId: String(row.vessel_id),
  kind: row.kind,
  openedAt: row.opened_at,
  heldSince: row.held_since,
  severity: row.severity,
  evidence: row.evidence,
  night: row.night,
  acknowledgedAt: row.acknowledged_at,
  snoozedUntil: row.snoozed_until,
})

/** Open notices of a system, locked until the transaction ends. */
export async function openNoticesOf(trx: Trx, systemId: string): Promise<OpenNotice[]> {
  const rows = await trx('notice')
    .where({ system_id: systemId })
    .whereNull('closed_at')
    .orderBy('id')
    .forUpdate()
    .select<NoticeRow[]>()
  return rows.map(toNotice)
}

export async function openNoticesOfKind(trx: Trx, kind: NoticeKind): Promise<OpenNotice[]> {
  const rows = await trx('notice').where({ kind }).whereNull('closed_at').orderBy('id').select<NoticeRow[]>()
  return rows.map(toNotice)
}

/** Kinds that somebody wants to hear nothing of for a while, on this system; outlives the notice it was said of. */
export async function snoozedKinds(trx: Trx, systemId: string, now: Date): Promise<NoticeKind[]> {
  const rows = await trx('notice')
    .where({ system_id: systemId })
    .where('snoozed_until', '>', now)
    .distinct<{ kind: NoticeKind }[]>('kind')
  return rows.map((row) => row.kind)
}

export interface NewNotice {
  systemId: string
  vesselId: string
  kind: NoticeKind
  at: Date
  severity: number
  reason: string
  evidence: Record<string, unknown>
  night?: string | null
}

/**
 * Opens a notice with its event. @returns the event's id, or null when one stands already (same system and
 * kind, or same night).
 */
export async function openNotice(
  trx: Trx,
  notice: NewNotice,
): Promise<{ noticeId: string; eventId: string } | null> {
  const [row] = await trx('notice')
    .insert({
      system_id: notice.systemId,
      vessel_id: notice.vesselId,
      kind: notice.kind,
      opened_at: notice.at,
      severity: notice.severity,
      reason: notice.reason,
      evidence: JSON.stringify(notice.evidence),
      night: notice.night ?? null,
    })
    .onConflict()
    .ignore()
    .returning<{ id: string }[]>('id')
  if (row === undefined) return null
  const noticeId = String(row.id)
  const eventId = await addEvent(trx, noticeId, 'opened', notice)
  return { noticeId, eventId }
}

/** Writes down a change of a notice; the same transition may come again, and is numbered then. */
export async function addEvent(
  trx: Trx,
  noticeId: string,
  transition: Transition,
  event: { at: Date; reason: string; evidence?: Record<string, unknown> },
): Promise<string> {
  const [row] = await trx('notice_event')
    .insert({
      notice_id: noticeId,
      at: event.at,
      transition,
      sequence: trx('notice_event')
        .where({ notice_id: noticeId, transition })
        .select(trx.raw('coalesce(max(sequence), 0) + 1')),
      reason: event.reason,
      evidence: JSON.stringify(event.evidence ?? {}),
    })
    .returning<{ id: string }[]>('id')
  if (row === undefined) throw new Error('the event was not written')
  return String(row.id)
}

export async function worsenNotice(
  trx: Trx,
  noticeId: string,
  to: { severity: number; reason: string; evidence: Record<string, unknown> },
): Promise<void> {
  await trx('notice')
    .where({ id: noticeId })
    .update({ severity: to.severity, reason: to.reason, evidence: JSON.stringify(to.evidence) })
}

export async function closeNotice(trx: Trx, noticeId: string, at: Date): Promise<void> {
  // A late upload may end what opened after the moment it tells of.
  await trx('notice')
    .where({ id: noticeId })
    .whereNull('closed_at')
    .update({ closed_at: trx.raw('greatest(opened_at, ?::timestamptz)', [at]), held_since: null })
}

export async function setHeld(trx: Trx, noticeId: string, since: Date | null): Promise<void> {
  await trx('notice').where({ id: noticeId }).update({ held_since: since })
}

/** @returns false when there is no such notice in sight of the transaction's role. */
export async function setAcknowledged(
  trx: Trx,
  noticeId: string,
  by: string | null,
  at: Date,
  note: string | null,
): Promise<boolean> {
  const count = await trx('notice')
    .where({ id: noticeId })
    .update({
      acknowledged_at: trx.raw('coalesce(acknowledged_at, ?::timestamptz)', [at]),
      acknowledged_by: trx.raw('coalesce(acknowledged_by, ?::bigint)', [by]),
      ...(note === null ? {} : { acknowledged_note: note }),
    })
  return count > 0
}

export async function setSnoozed(trx: Trx, noticeId: string, until: Date | null): Promise<boolean> {
  const count = await trx('notice').where({ id: noticeId }).update({ snoozed_until: until })
  return count > 0
}
