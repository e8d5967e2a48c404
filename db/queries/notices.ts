import type { Trx } from '@/db/roles'
import type { MessageChannel, NoticeKind } from '@/shared/schemas'

export interface NoticeRow {
  id: string
  vesselId: string
  systemId: string
  vesselName: string
  systemName: string
  timeZone: string
  kind: NoticeKind
  openedAt: Date
  closedAt: Date | null
  heldSince: Date | null
  acknowledgedAt: Date | null
  acknowledgedBy: string | null
  acknowledgedNote: string | null
  snoozedUntil: Date | null
  night: string | null
  reason: string
  evidence: Record<string, unknown>
}

export interface NoticeFilter {
  state?: 'open' | 'closed' | undefined
  vesselId?: string | undefined
  systemId?: string | undefined
  noticeId?: string | undefined
  /** Place of the last item of the page before. */
  after?: { openedAt: Date; id: string } | undefined
  limit: number
}

/** Notices of the vessels the person sees, ascending by when they opened. */
export async function readNotices(trx: Trx, filter: NoticeFilter): Promise<NoticeRow[]> {
  const { rows } = await trx.raw<{ rows: NoticeRow[] }>(
    `select n.id, n.vessel_id as "vesselId", n.system_id as "systemId", v.name as "vesselName", s.name as "systemName",
       v.time_zone as "timeZone", n.kind, n.opened_at as "openedAt", n.closed_at as "closedAt", n.held_since as "heldSince",
       n.acknowledged_at as "acknowledgedAt", p.name as "acknowledgedBy", n.acknowledged_note as "acknowledgedNote",
       n.snoozed_until as "snoozedUntil", n.night, n.reason, n.evidence
     from notice n join vessel v on v.id = n.vessel_id join system s on s.id = n.system_id
     left join person p on p.id = n.acknowledged_by
     where (cast(:state as text) is null or (n.closed_at is null) = (:state = 'open'))
       and (cast(:vessel as bigint) is null or n.vessel_id = :vessel)
       and (cast(:system as bigint) is null or n.system_id = :system)
       and (cast(:notice as bigint) is null or n.id = :notice)
       and (cast(:afterId as bigint) is null or (n.opened_at, n.id) > (cast(:afterAt as timestamptz), cast(:afterId as bigint)))
     order by n.opened_at, n.id limit :limit`,
    {
      state: filter.state ?? null,
      vessel: filter.vesselId ?? null,
      system: filter.systemId ?? null,
      notice: filter.noticeId ?? null,
      afterId: filter.after?.id ?? null,
      afterAt: filter.after?.openedAt ?? null,
      limit: filter.limit,
    },
  )
  return rows
}

export interface NoticeEventRow {
  at: Date
  transition: 'opened' | 'worsened' | 'ended' | 'held' | 'resumed' | 'acknowledged' | 'snoozed' | 'escalated'
  reason: string
}

export async function readNoticeEvents(trx: Trx, noticeId: string): Promise<NoticeEventRow[]> {
  return trx('notice_event')
    .where({ notice_id: noticeId })
    .orderBy(['at', 'id'])
    .select<NoticeEventRow[]>('at', 'transition', 'reason')
}

export interface ToldRow {
  messageId: string
  name: string
  channel: MessageChannel
  queuedAt: Date
  acceptedAt: Date | null
  deliveredAt: Date | null
  failedAt: Date | null
}

/**
 * Who was told of a notice, and how far the message came; neither address nor text. Under the service's role, for
 * somebody who sees the notice.
 */
export async function readTold(trx: Trx, noticeId: string): Promise<ToldRow[]> {
  const { rows } = await trx.raw<{ rows: ToldRow[] }>(
    `select distinct m.id as "messageId", p.name, m.channel, m.queued_at as "queuedAt", m.accepted_at as "acceptedAt",
       m.delivered_at as "deliveredAt", m.failed_at as "failedAt"
     from message_subject s join notice_event e on e.id = s.notice_event_id join message m on m.id = s.message_id
     join person p on p.id = m.person_id
     where e.notice_id = ? order by m.queued_at, m.id`,
    [noticeId],
  )
  return rows
}
