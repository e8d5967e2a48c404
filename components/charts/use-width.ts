'use client'

import { useCallback, useState } from 'react'

/** The width of an element in CSS pixels, followed as it changes; 0 until it is known. */
export function useWidth(): [(element: HTMLElement | null) => void | (() => void), number] {
  const [width, setWidth] = useState(0)
  const attach = useCallback((element: HTMLElement | null) => {
    if (!element) return
    const observer = new ResizeObserver((entries) => {
      const box = entries[0]?.contentRect
      if (box) setWidth(Math.floor(box.width))
    })
    observer.observe(element)
    return () => observer.disconnect()
  }, [])
  return [attach, width]
}
