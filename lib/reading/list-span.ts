import type { ListSpan } from '@/db/queries/runs-and-holds'
import { Problem } from '@/lib/problem'
import type { List, SpanQuery } from '@/shared/schemas'

const dateOf = (text: string | undefined): Date | null => (text === undefined ? null : new Date(text))

/** A query's span; one item more than the page is asked for, to know whether another follows. */
export function listSpan(query: SpanQuery, now: Date): ListSpan {
  const after = dateOf(query.cursor)
  if (after !== null && Number.isNaN(after.getTime()))
    throw new Problem('bad-request', 'The cursor is not one that this list gave: begin again without it.')
  return {
    from: dateOf(query.from),
    to: dateOf(query.to),
    at: dateOf(query.at) ?? now,
    after,
    limit: query.limit + 1,
  }
}

/**
 * The page of a list ordered by `startedAt`, what is still open last.
 * @param rows up to one more than `limit`
 */
export function pageByStart<Item extends { startedAt: string }>(
  rows: Item[],
  open: Item | null,
  span: ListSpan,
): List<Item> {
  const limit = span.limit - 1
  const all = open !== null && holds(span, new Date(open.startedAt)) ? [...rows, open] : rows
  const items = all.slice(0, limit)
  const last = items[items.length - 1]
  return { items, next: all.length > limit && last !== undefined ? last.startedAt : null }
}

const holds = ({ from, to, after }: ListSpan, start: Date): boolean =>
  (from === null || start >= from) && (to === null || start < to) && (after === null || start > after)
