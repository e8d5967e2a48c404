'use client'

import useSWR, { type SWRResponse } from 'swr'
import { ApiProblem, request } from '@/components/data/request'

type Options = { refreshMs?: number; keepPrevious?: boolean }

/**
 * Reads an address of our own API and keeps it fresh. `null` waits. The server has parsed its answer against
 * the shared schema whose type is `Answer`, so it is taken as such here.
 */
export function useApi<Answer>(path: string | null, options: Options = {}): SWRResponse<Answer, ApiProblem> {
  return useSWR<Answer, ApiProblem>(path, request<Answer>, {
    refreshInterval: options.refreshMs ?? 0,
    keepPreviousData: options.keepPrevious ?? false,
    revalidateOnFocus: true,
    dedupingInterval: 2_000,
    // What is not there, or not ours to see, does not appear by asking again.
    shouldRetryOnError: (problem: ApiProblem) => problem.status === 0 || problem.status >= 500,
  })
}
