'use client'

import { LeakDownSheet } from '@/components/calculators/leak-down-sheet'
import { GAUGE_RESOLUTION_PA, judgeLeakDown } from '@/lib/analysis/leak-down'

/** Brings the arithmetic to the sheet: it runs in the browser, so the page works without a connection. */
export function LeakDown() {
  return <LeakDownSheet judge={judgeLeakDown} resolutions={GAUGE_RESOLUTION_PA} />
}
