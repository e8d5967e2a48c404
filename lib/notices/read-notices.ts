import { readNoticeEvents, readNotices, readTold, type NoticeRow } from '@/db/queries/notices'
import { asIngest, asPerson, type Trx } from '@/db/roles'
import { noSuch } from '@/lib/access/require-right'
import { Problem } from '@/lib/problem'
import type { List, Notice, NoticeWhole } from '@/shared/schemas'

const text = (at: Date | null): string | null => at?.toISOString() ?? null

export const noticeOnWire = (row: NoticeRow): Notice => ({
  ...row,
  openedAt: row.openedAt.toISOString(),
  closedAt: text(row.closedAt),
  heldSince: text(row.heldSince),
  acknowledgedAt: text(row.acknowledgedAt),
  snoozedUntil: text(row.snoozedUntil),
})

/** Notices of the vessels one sees, ascending by opening. */
export async function listNotices(
  personId: string,
  query: {
    limit: number
    cursor?: string | undefined
    state?: 'open' | 'closed' | undefined
    vessel?: string | undefined
    system?: string | undefined
  },
): Promise<List<Notice>> {
  const rows = await asPerson(personId, (trx) =>
    readNotices(trx, {
      state: query.state,
      vesselId: query.vessel,
      systemId: query.system,
      after: query.cursor === undefined ? undefined : placeOf(query.cursor),
      limit: query.limit + 1,
    }),
  )
  const page = rows.slice(0, query.limit)
  const last = page[page.length - 1]
  return {
    items: page.map(noticeOnWire),
    next: rows.length > query.limit && last ? `${last.openedAt.toISOString()}_${last.id}` : null,
  }
}

function placeOf(cursor: string): { openedAt: Date; id: string } {
  const [at = '', id = ''] = cursor.split('_')
  const openedAt = new Date(at)
  if (Number.isNaN(openedAt.getTime()) || !/^\d{1,18}$/.test(id))
    throw new Problem('bad-request', 'The cursor is not one that this list gave: begin again without it.')
  return { openedAt, id }
}

/** @throws Problem `not-found` */
export async function requireNotice(trx: Trx, noticeId: string): Promise<NoticeRow> {
  const [row] = await readNotices(trx, { noticeId, limit: 1 })
  if (row === undefined) throw noSuch('notice')
  return row
}

/** A notice with its history and who was told. @throws Problem `not-found` */
export async function getNotice(personId: string, noticeId: string): Promise<NoticeWhole> {
  const { notice, events } = await asPerson(personId, async (trx) => ({
    notice: await requireNotice(trx, noticeId),
    events: await readNoticeEvents(trx, noticeId),
  }))
  const told = await asIngest((trx) => readTold(trx, noticeId))
  return {
    ...noticeOnWire(notice),
    events: events.map((event) => ({ ...event, at: event.at.toISOString() })),
    told: told.map((row) => ({
      ...row,
      queuedAt: row.queuedAt.toISOString(),
      acceptedAt: text(row.acceptedAt),
      deliveredAt: text(row.deliveredAt),
      failedAt: text(row.failedAt),
    })),
  }
}
