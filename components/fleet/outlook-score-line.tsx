'use client'

import { useApi } from '@/components/data/use-api'
import { outlookScoreWords } from '@/components/fleet/outlook-score-words'
import type { OutlookScore } from '@/shared/schemas'

/** How the nights foretold came out, in one line; nothing until a night has been scored. */
export function OutlookScoreLine() {
  const { data } = useApi<OutlookScore>('/api/outlook-score', { refreshMs: 15 * 60_000 })
  const said = data ? outlookScoreWords(data) : ''
  return said === '' ? null : <p className="datum mb-4 -mt-2">{said}</p>
}
