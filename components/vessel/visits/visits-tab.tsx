'use client'

import Link from 'next/link'
import { withQuery } from '@/components/data/request'
import { useApi } from '@/components/data/use-api'
import { useNow } from '@/components/data/use-now'
import { dayAndClock } from '@/components/time'
import { AskVisit } from '@/components/tonight/ask-visit'
import { Empty, Loading, Trouble } from '@/components/ui/sheet-states'
import { useVessel } from '@/components/vessel/use-vessel'
import { STATUS_WORDS, VERDICT_WORDS } from '@/components/vessel/visits/words'
import type { List, Visit } from '@/shared/schemas'

/** When a visit is or was: planned for, begun, or asked. */
function whenWords(visit: Visit, at: (instant: string) => string): string {
  if (visit.startedAt) return at(visit.startedAt)
  if (visit.plannedFor) return `for ${at(visit.plannedFor)}`
  return `asked ${at(visit.askedAt)}`
}

/** The visits to this vessel, newest first, and a way to ask for one. */
export function VisitsTab({ id }: { id: string }) {
  const now = useNow()
  const { vessel } = useVessel(id)
  const { data, error, mutate } = useApi<List<Visit>>(vessel ? `/api/visits?vessel=${vessel.id}` : null)
  if (!vessel) return null
  const at = (instant: string) => dayAndClock(instant, vessel.utcOffsetSeconds, now)
  const items = [...(data?.items ?? [])].sort((a, b) => Date.parse(b.askedAt) - Date.parse(a.askedAt))
  return (
    <div className="mt-5">
      {error ? <Trouble title={error.message} retry={() => void mutate()} /> : null}
      {!data && !error ? <Loading what="the visits" /> : null}
      {data && items.length === 0 ? (
        <Empty title="Nobody has come yet">A visit that is asked for stands here.</Empty>
      ) : null}
      {items.length > 0 ? (
        <div className="overflow-x-auto" tabIndex={0} role="region" aria-label="Visits">
          <table className="ruled">
            <thead>
              <tr>
                <th scope="col">When</th>
                <th scope="col">Stands</th>
                <th scope="col">Why</th>
                <th scope="col">Who</th>
                <th scope="col">What came of it</th>
              </tr>
            </thead>
            <tbody>
              {items.map((visit) => (
                <tr key={visit.id}>
                  <td className="whitespace-nowrap">{whenWords(visit, at)}</td>
                  <td>{STATUS_WORDS[visit.status]}</td>
                  <td>{visit.complaint}</td>
                  <td>{visit.assignedTo?.name ?? visit.shopName}</td>
                  <td>
                    {visit.summary}
                    {visit.verdict ? (
                      <span className="datum block">{VERDICT_WORDS[visit.verdict]}</span>
                    ) : null}
                    {visit.startedAt ? (
                      <Link
                        className="no-print block"
                        href={`${withQuery(`/vessels/${id}/record`, { system: visit.systemId ?? undefined, visit: visit.id })}#compare-title`}
                      >
                        Before and after
                      </Link>
                    ) : null}
                  </td>
                </tr>
              ))}
            </tbody>
          </table>
        </div>
      ) : null}
      <div className="no-print mt-7">
        <AskVisit vessel={vessel} />
      </div>
    </div>
  )
}
