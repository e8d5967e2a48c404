import type { List } from '@/shared/schemas'

/**
 * One page of a list held in memory in its order: what follows the item named by the cursor.
 * An item that has gone meanwhile starts the list again rather than ending it.
 */
export function pageOf<Item>(
  items: readonly Item[],
  page: { limit: number; cursor?: string | undefined },
  keyOf: (item: Item) => string,
): List<Item> {
  const after = page.cursor === undefined ? -1 : items.findIndex((item) => keyOf(item) === page.cursor)
  const slice = items.slice(after + 1, after + 1 + page.limit)
  const last = slice[slice.length - 1]
  const more = after + 1 + slice.length < items.length
  return { items: slice, next: more && last !== undefined ? keyOf(last) : null }
}
