import type { Trx } from '@/db/roles'
import type { MessageChannel } from '@/shared/schemas'

export interface MessageRow {
  id: string
  personId: string | null
  personName: string | null
  channel: MessageChannel
  to: string
  subject: string | null
  text: string
  html: string | null
  linkCode: string | null
  queuedAt: Date
  sendAfter: Date
  acceptedAt: Date | null
  deliveredAt: Date | null
  failedAt: Date | null
  failure: string | null
  noticeIds: string[]
}

const COLUMNS = `m.id, m.person_id as "personId", p.name as "personName", m.channel, m.address as "to", m.subject,
  m.body_text as text, m.body_html as html, m.link_code as "linkCode", m.queued_at as "queuedAt", m.send_after as "sendAfter",
  m.accepted_at as "acceptedAt", m.delivered_at as "deliveredAt", m.failed_at as "failedAt", m.failure,
  array(select distinct e.notice_id::text from message_subject s join notice_event e on e.id = s.notice_event_id
    where s.message_id = m.id) as "noticeIds"`

export interface MessageFilter {
  /** Shops whose manager asks: messages about boats they see, and those to their staff that tell of no boat. */
  shopIds: string[]
  state?: 'waiting' | 'sent' | 'failed' | undefined
  messageId?: string | undefined
  afterId?: string | undefined
  limit: number
}

/** The message log of shops, oldest first. Under the service's role: names of receivers are told to a manager. */
export async function readMessages(trx: Trx, filter: MessageFilter): Promise<MessageRow[]> {
  const { rows } = await trx.raw<{ rows: MessageRow[] }>(
    `select ${COLUMNS} from message m left join person p on p.id = m.person_id
     where m.purpose <> 'account' and m.cancelled_at is null
       and (m.person_id in (select person_id from membership where shop_id = any (cast(:shops as bigint[])) and ended_at is null)
           and not exists (select 1 from message_subject s where s.message_id = m.id)
         or m.id in (select s.message_id from message_subject s join notice_event e on e.id = s.notice_event_id
           join notice n on n.id = e.notice_id join vessel v on v.id = n.vessel_id
           where v.kept_by_shop_id = any (cast(:shops as bigint[])) or v.id in (
             select vessel_id from shop_access where shop_id = any (cast(:shops as bigint[])) and withdrawn_at is null)))
       and (cast(:state as text) is null or :state = case when m.failed_at is not null then 'failed'
         when m.accepted_at is not null then 'sent' else 'waiting' end)
       and (cast(:message as bigint) is null or m.id = :message)
       and (cast(:after as bigint) is null or m.id > :after)
     order by m.id limit :limit`,
    {
      shops: filter.shopIds,
      state: filter.state ?? null,
      message: filter.messageId ?? null,
      after: filter.afterId ?? null,
      limit: filter.limit,
    },
  )
  return rows
}

/** Every message a service has accepted, oldest first: the demo's outbox. */
export async function readOutbox(trx: Trx, limit: number): Promise<MessageRow[]> {
  const { rows } = await trx.raw<{ rows: MessageRow[] }>(
    `select * from (select ${COLUMNS} from message m left join person p on p.id = m.person_id
       where m.accepted_at is not null order by m.accepted_at desc, m.id desc limit ?) x
     order by "acceptedAt", id`,
    [limit],
  )
  return rows
}
