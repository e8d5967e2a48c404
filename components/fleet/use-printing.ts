'use client'

import { useEffect, useState } from 'react'
import { flushSync } from 'react-dom'

/** True while the sheet is being printed: paper does not scroll, so everything must be on it. */
export function usePrinting(): boolean {
  const [printing, setPrinting] = useState(false)
  useEffect(() => {
    // The browser takes its picture when the event returns; the change has to be drawn by then.
    const before = () => flushSync(() => setPrinting(true))
    const after = () => setPrinting(false)
    window.addEventListener('beforeprint', before)
    window.addEventListener('afterprint', after)
    return () => {
      window.removeEventListener('beforeprint', before)
      window.removeEventListener('afterprint', after)
    }
  }, [])
  return printing
}
