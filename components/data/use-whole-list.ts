'use client'

import useSWR, { type SWRResponse } from 'swr'
import { request, type ApiProblem } from '@/components/data/request'
import type { List } from '@/shared/schemas'

const MOST_PAGES = 6

/** Follows a list's cursors to its end, or for six pages of at most 5,000. */
async function requestWhole<Item>(path: string): Promise<Item[]> {
  const items: Item[] = []
  let next: string | null = null
  for (let page = 0; page < MOST_PAGES; page += 1) {
    const address: string = next === null ? path : `${path}&cursor=${encodeURIComponent(next)}`
    const list: List<Item> = await request<List<Item>>(address)
    items.push(...list.items)
    next = list.next
    if (next === null) break
  }
  return items
}

/** A list read whole; `path` must have a query already. */
export function useWholeList<Item>(path: string | null): SWRResponse<Item[], ApiProblem> {
  return useSWR<Item[], ApiProblem>(path, requestWhole<Item>, {
    keepPreviousData: true,
    revalidateOnFocus: false,
    shouldRetryOnError: (problem: ApiProblem) => problem.status === 0 || problem.status >= 500,
  })
}
