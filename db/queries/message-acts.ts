import type { Trx } from '@/db/roles'
import type { NoticeKind } from '@/shared/schemas/words'

export interface ActableMessage {
  messageId: string
  personId: string
  queuedAt: Date
}

interface Row {
  id: string
  person_id: string | null
  queued_at: Date
}

const toMessage = (row: Row | undefined): ActableMessage | null =>
  row === undefined || row.person_id === null
    ? null
    : { messageId: String(row.id), personId: String(row.person_id), queuedAt: row.queued_at }

export async function messageByLink(trx: Trx, code: string, since: Date): Promise<ActableMessage | null> {
  const row = await trx('message')
    .where({ link_code: code, purpose: 'notice' })
    .where('queued_at', '>=', since)
    .whereNull('cancelled_at')
    .first<Row | undefined>('id', 'person_id', 'queued_at')
  return toMessage(row)
}

/** The newest text about notices that was sent to a number: what a reply from it is about. */
export async function lastTextTo(trx: Trx, address: string, since: Date): Promise<ActableMessage | null> {
  const row = await trx('message')
    .where({ channel: 'sms', address, purpose: 'notice' })
    .where('queued_at', '>=', since)
    .whereNotNull('accepted_at')
    .orderBy('accepted_at', 'desc')
    .orderBy('id', 'desc')
    .first<Row | undefined>('id', 'person_id', 'queued_at')
  return toMessage(row)
}

export interface ToldNotice {
  noticeId: string
  kind: NoticeKind
  systemId: string
  vesselId: string
  vesselName: string
  systemName: string
  reason: string
  openedAt: Date
  closedAt: Date | null
  acknowledgedAt: Date | null
  snoozedUntil: Date | null
}

/** The notices a message tells of, on vessels that its receiver still owns or whose shop still may see them. */
export async function noticesOfMessage(trx: Trx, message: ActableMessage): Promise<ToldNotice[]> {
  const { rows } = (await trx.raw(
    `select distinct on (n.id) n.id, n.kind, n.system_id, n.vessel_id, v.name as vessel_name, s.name as system_name,
       n.reason, n.opened_at, n.closed_at, n.acknowledged_at, n.snoozed_until
     from message_subject ms join notice_event e on e.id = ms.notice_event_id join notice n on n.id = e.notice_id
     join vessel v on v.id = n.vessel_id join system s on s.id = n.system_id
     where ms.message_id = :message and (
       exists (select 1 from vessel_owner o where o.vessel_id = v.id and o.person_id = :person and o.ended_at is null)
       or exists (select 1 from membership m where m.person_id = :person and m.ended_at is null
         and (m.shop_id = v.kept_by_shop_id or m.shop_id in (
           select a.shop_id from shop_access a where a.vessel_id = v.id and a.withdrawn_at is null))))
     order by n.id`,
    { message: message.messageId, person: message.personId },
  )) as {
    rows: {
      id: string
      kind: NoticeKind
      system_id: string
      vessel_id: string
      vessel_name: string
      system_name: string
      reason: string
      opened_at: Date
      closed_at: Date | null
      acknowledged_at: Date | null
      snoozed_until: Date | null
    }[]
  }
  return rows.map((row) => ({
    noticeId: String(row.id),
    kind: row.kind,
    systemId: String(row.system_id),
    vesselId: String(row.vessel_id),
    vesselName: row.vessel_name,
    systemName: row.system_name,
    reason: row.reason,
    openedAt: row.opened_at,
    closedAt: row.closed_at,
    acknowledgedAt: row.acknowledged_at,
    snoozedUntil: row.snoozed_until,
  }))
}

/** The shop that looks after a vessel: the one let in last, or the one that keeps it. */
export async function shopOfVessel(trx: Trx, vesselId: string): Promise<{ id: string; name: string } | null> {
  const row = await trx('shop as s')
    .join('vessel as v', (join) => void join.on(trx.raw('v.id = ?', [vesselId])))
    .leftJoin('shop_access as a', (join) => {
      join.on('a.shop_id', 's.id').andOn('a.vessel_id', 'v.id').andOnNull('a.withdrawn_at')
    })
    .where((which) => void which.whereNotNull('a.id').orWhereRaw('v.kept_by_shop_id = s.id'))
    .orderByRaw('a.granted_at desc nulls last')
    .first<{ id: string; name: string } | undefined>('s.id', 's.name')
  return row === undefined ? null : { id: String(row.id), name: row.name }
}

/** Asks a shop for a visit. @returns null when one has been asked for or planned already. */
export async function insertAskedVisit(
  trx: Trx,
  visit: { vesselId: string; systemId: string; shopId: string; askedBy: string; complaint: string; at: Date },
): Promise<string | null> {
  const standing = await trx('visit')
    .where({ vessel_id: visit.vesselId, shop_id: visit.shopId })
    .whereIn('status', ['asked', 'planned', 'under-way'])
    .first('id')
  if (standing !== undefined) return null
  const [row] = await trx('visit')
    .insert({
      vessel_id: visit.vesselId,
      system_id: visit.systemId,
      shop_id: visit.shopId,
      complaint: visit.complaint,
      asked_by: visit.askedBy,
      asked_at: visit.at,
    })
    .returning<{ id: string }[]>('id')
  return row === undefined ? null : String(row.id)
}

export async function managersOf(trx: Trx, shopId: string): Promise<{ personId: string; email: string }[]> {
  const rows = await trx('membership as m')
    .join('person as p', 'p.id', 'm.person_id')
    .where({ 'm.shop_id': shopId, 'm.role': 'manager' })
    .whereNull('m.ended_at')
    .whereNull('p.deleted_at')
    .orderBy('p.id')
    .select<{ id: string; email: string }[]>('p.id', 'p.email')
  return rows.map((row) => ({ personId: String(row.id), email: row.email }))
}

/** Notes a text that came in. @returns false when the service had handed it in before. */
export async function insertInbound(
  trx: Trx,
  text: { serviceId: string; at: Date; address: string; word: string | null; personId: string | null },
): Promise<boolean> {
  const rows = await trx('inbound_text')
    .insert({
      service_id: text.serviceId,
      at: text.at,
      address: text.address,
      word: text.word,
      person_id: text.personId,
      did: 'received',
    })
    .onConflict()
    .ignore()
    .returning<{ service_id: string }[]>('service_id')
  return rows.length > 0
}

export async function noteInbound(trx: Trx, serviceId: string, did: string): Promise<void> {
  await trx('inbound_text').where({ service_id: serviceId }).update({ did })
}

/** How many texts a number has sent since an instant: an automatic answerer must not keep us talking. */
export async function inboundCount(trx: Trx, address: string, since: Date): Promise<number> {
  const row = await trx('inbound_text')
    .where({ address })
    .where('at', '>=', since)
    .count<{ count: string }[]>()
    .first()
  return Number(row?.count ?? 0)
}
