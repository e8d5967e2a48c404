import { readMessages, readOutbox, type MessageRow } from '@/db/queries/messages'
import { asIngest } from '@/db/roles'
import { noSuch } from '@/lib/access/require-right'
import type { Who } from '@/lib/auth/who'
import { Problem } from '@/lib/problem'
import type { List, Message, Outbox } from '@/shared/schemas'
import { resendMessage as resend } from './resend-message'

const OUTBOX_LIMIT = 1000
const text = (at: Date | null): string | null => at?.toISOString() ?? null

const onWire = (row: MessageRow): Message => ({
  id: row.id,
  personId: row.personId,
  personName: row.personName,
  channel: row.channel,
  to: row.to,
  subject: row.subject,
  // The link acts for its receiver alone.
  text: row.linkCode === null ? row.text : row.text.replaceAll(row.linkCode, '…'),
  queuedAt: row.queuedAt.toISOString(),
  sendAfter: row.sendAfter.toISOString(),
  acceptedAt: text(row.acceptedAt),
  deliveredAt: text(row.deliveredAt),
  failedAt: text(row.failedAt),
  failure: row.failure,
  noticeIds: row.noticeIds,
})

/** @throws Problem `not-allowed` for everybody but managers */
function shopsManaged(who: Who): string[] {
  const shops = who.memberships.filter(({ role }) => role === 'manager').map(({ shopId }) => shopId)
  if (shops.length === 0) throw new Problem('not-allowed', 'The message log is for managers of a shop.')
  return shops
}

/** The message log of the shops that the person manages, oldest first. */
export async function listMessages(
  who: Who,
  query: {
    limit: number
    cursor?: string | undefined
    state?: 'waiting' | 'sent' | 'failed' | undefined
  },
): Promise<List<Message>> {
  const shopIds = shopsManaged(who)
  if (query.cursor !== undefined && !/^\d{1,18}$/.test(query.cursor))
    throw new Problem('bad-request', 'The cursor is not one that this list gave: begin again without it.')
  const rows = await asIngest((trx) =>
    readMessages(trx, { shopIds, state: query.state, afterId: query.cursor, limit: query.limit + 1 }),
  )
  const page = rows.slice(0, query.limit)
  const last = page[page.length - 1]
  return { items: page.map(onWire), next: rows.length > query.limit && last ? last.id : null }
}

/** Sends a given-up message again. @throws Problem `not-found`, `not-allowed`, `conflict` when it was not given up */
export async function resendMessage(who: Who, messageId: string, now: Date): Promise<{ done: true }> {
  const shopIds = shopsManaged(who)
  return asIngest(async (trx) => {
    const [message] = await readMessages(trx, { shopIds, messageId, limit: 1 })
    if (message === undefined) throw noSuch('message')
    if (!(await resend(trx, messageId, now)))
      throw new Problem('conflict', 'The message was not given up: there is nothing to send again.')
    return { done: true }
  })
}

/** What was sent, oldest first, for demo and test. */
export async function getOutbox(): Promise<Outbox> {
  const rows = await asIngest((trx) => readOutbox(trx, OUTBOX_LIMIT))
  return {
    items: rows.map((row) => ({
      id: row.id,
      at: (row.acceptedAt ?? row.queuedAt).toISOString(),
      channel: row.channel,
      to: row.to,
      subject: row.subject,
      text: row.text,
      html: row.html,
      noticeId: row.noticeIds[0] ?? null,
    })),
  }
}
