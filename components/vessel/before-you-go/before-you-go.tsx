'use client'

import { useApi } from '@/components/data/use-api'
import { BeforeYouGoCautions } from '@/components/vessel/before-you-go/cautions'
import { SuspectItem } from '@/components/vessel/before-you-go/suspect-item'
import { notEnoughWords, suspectsFinding, whatToBring } from '@/components/vessel/before-you-go/words'
import { Loading, Trouble } from '@/components/ui/sheet-states'
import type { Suspects, System, Vessel } from '@/shared/schemas'

const REFRESH_MS = 15 * 60_000

/** For those who go aboard to mend: what the record says leaks, what to ask and bring, and the care it takes. */
export function BeforeYouGo({ vessel, system }: { vessel: Vessel; system: System }) {
  const { workVisit, fullRecord } = vessel.rights
  const isFor = workVisit && fullRecord
  const { data, error, mutate } = useApi<Suspects>(isFor ? `/api/systems/${system.id}/suspects` : null, {
    refreshMs: REFRESH_MS,
  })
  if (!isFor) return null
  return (
    <section aria-labelledby="before-title" className="mt-9 max-w-[46em]">
      <h2 id="before-title" className="mb-2">
        Before you go
      </h2>
      {error ? <Trouble title={error.message} retry={() => void mutate()} /> : null}
      {!data && !error ? <Loading what="what the record says" /> : null}
      {data ? (
        <>
          <p>{suspectsFinding(data)}</p>
          {data.suspects.length > 0 ? (
            <ol className="mt-3 grid list-decimal gap-4 border-t border-line pt-3 pl-5">
              {data.suspects.map((suspect) => (
                <SuspectItem key={suspect.family} suspect={suspect} />
              ))}
            </ol>
          ) : null}
          <p className="mt-4">
            <span className="font-semibold">Bring </span>
            {whatToBring(data).join(', ')}. Clean and tighten before you replace.
          </p>
          <details className="mt-3">
            <summary>What the record cannot say</summary>
            <ul className="mt-2 grid list-disc gap-1 pl-5 text-ink-2">
              {data.notEnough.map((entry) => (
                <li key={entry.signature}>{notEnoughWords(entry)}</li>
              ))}
              <li>By readings alone nobody tells {data.inseparable.join('; ')}.</li>
            </ul>
          </details>
        </>
      ) : null}
      <BeforeYouGoCautions />
    </section>
  )
}
