'use client'

import { useSWRConfig } from 'swr'

/** Reads anew whatever a change of the set-up bears on; resolves once it is there. */
export function useRefresh(): () => Promise<void> {
  const { mutate } = useSWRConfig()
  return async () => {
    await mutate((key) => typeof key === 'string' && /^\/api\/(vessels|systems|nights)/.test(key))
  }
}
