'use client'

import { useMemo } from 'react'
import type { ZoneOffset } from '@/components/time'

/** The same array as long as it says the same: a chart is not built anew because an answer was read again. */
export function useSameOffsets(offsets: readonly ZoneOffset[]): readonly ZoneOffset[] {
  const text = JSON.stringify(offsets)
  return useMemo((): ZoneOffset[] => JSON.parse(text), [text])
}
