import type { Trx } from '@/db/roles'
import type { NoticeKind } from '@/shared/schemas/words'

export type Transition =
  'opened' | 'worsened' | 'ended' | 'held' | 'resumed' | 'acknowledged' | 'snoozed' | 'escalated'

/** A change of a notice with the boat it is about: all that a message is written from. */
export interface ToldEvent {
  eventId: string
  noticeId: string
  kind: NoticeKind
  transition: Transition
  at: Date
  reason: string
  evidence: Record<string, unknown>
  night: string | null
  systemId: string
  vesselId: string
  vesselName: string
  /** Empty when the vessel has one system. */
  systemName: string
  timeZone: string
}

export async function toldEvents(trx: Trx, eventIds: string[]): Promise<ToldEvent[]> {
  const { rows } = (await trx.raw(
    `select e.id as event_id, n.id as notice_id, n.kind, e.transition, e.at, e.reason, e.evidence, n.night,
       n.system_id, n.vessel_id, v.name as vessel_name, v.time_zone,
       case when (select count(*) from system o where o.vessel_id = v.id) > 1 then s.name else '' end as system_name
     from notice_event e join notice n on n.id = e.notice_id join vessel v on v.id = n.vessel_id
     join system s on s.id = n.system_id
     where e.id = any (:ids::bigint[]) order by v.name, e.id`,
    { ids: eventIds },
  )) as { rows: Row[] }
  return rows.map((row) => ({
    eventId: String(row.event_id),
    noticeId: String(row.notice_id),
    kind: row.kind,
    transition: row.transition,
    at: row.at,
    reason: row.reason,
    evidence: row.evidence,
    night: row.night,
    systemId: String(row.system_id),
    vesselId: String(row.vessel_id),
    vesselName: row.vessel_name,
    systemName: row.system_name,
    timeZone: row.time_zone,
  }))
}

interface Row {
  event_id: string
  notice_id: string
  kind: NoticeKind
  transition: Transition
  at: Date
  reason: string
  evidence: Record<string, unknown>
  night: string | null
  system_id: string
  vessel_id: string
  vessel_name: string
  time_zone: string
  system_name: string
}
