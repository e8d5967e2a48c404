'use client'

import { useApi } from '@/components/data/use-api'
import { useNow } from '@/components/data/use-now'
import { CupTestForm } from '@/components/tonight/cup-test-form'
import { CupTestPast } from '@/components/tonight/cup-test-past'
import { CupTestRunning } from '@/components/tonight/cup-test-running'
import type { CupTestResult, List, System, Vessel } from '@/shared/schemas'

const MINUTE_MS = 60_000
/** How long a result stays on the page by itself; later it is under those done before. */
const NEWS_MS = 48 * 3_600_000

/**
 * The best test of all, with no tools: which bowl's seal lets the air in. `offered` on evenings that leak; a bowl
 * that is wet stands here on any.
 */
export function CupTest({ vessel, system, offered }: { vessel: Vessel; system: System; offered: boolean }) {
  const now = useNow()
  const may = vessel.rights.fullRecord && vessel.rights.setAboard
  const tests = useApi<List<CupTestResult>>(may ? `/api/systems/${system.id}/cup-tests` : null, {
    refreshMs: MINUTE_MS,
  })
  if (!may) return null
  const items = tests.data?.items ?? []
  const [newest] = items
  const shown = newest && (newest.open || now - Date.parse(newest.waterAt) < NEWS_MS) ? newest : null
  const past = shown ? items.slice(1) : items
  const waiting = shown !== null && shown.open && shown.verdict === null
  if (!offered && !shown) return null
  return (
    <div role="group" className="mt-5 max-w-[38em]" aria-label="Cup test">
      {shown ? (
        <CupTestRunning
          test={shown}
          systemId={system.id}
          offsetSeconds={vessel.utcOffsetSeconds}
          nowMs={now}
          changed={() => void tests.mutate()}
        />
      ) : null}
      {waiting || !tests.data ? null : (
        <details className="mt-2">
          <summary className="py-2.5">
            {shown ? 'Try another bowl' : 'Find the bowl yourself: the cup test'}
          </summary>
          <ol className="mt-2 grid list-decimal gap-1.5 pl-5">
            <li>Flush nothing for half an hour, so that the leak shows by itself.</li>
            <li>Pour a cup of water into one bowl only, without flushing, and say here which.</li>
            <li>Again flush nothing for half an hour: this page says what the leak did.</li>
            <li>Then flush that bowl. A leak that comes back makes it certain; a cleared bowl makes way.</li>
          </ol>
          <CupTestForm system={system} changed={() => void tests.mutate()} />
        </details>
      )}
      <CupTestPast tests={past} offsetSeconds={vessel.utcOffsetSeconds} nowMs={now} />
    </div>
  )
}
