'use client'

import { useEffect, useState } from 'react'

/** The time, renewed every `everyMs`: for "3 min ago" that stays true while the page is open. */
export function useNow(everyMs = 30_000): number {
  const [now, setNow] = useState(() => Date.now())
  useEffect(() => {
    const timer = setInterval(() => setNow(Date.now()), everyMs)
    return () => clearInterval(timer)
  }, [everyMs])
  return now
}
