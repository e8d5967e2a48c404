'use client'

import { useApi } from '@/components/data/use-api'
import { useUnits } from '@/components/shell/units-context'
import { Loading, Trouble } from '@/components/ui/sheet-states'
import { compareFinding, compareRows } from '@/components/vessel/record/compare-words'
import type { Comparison } from '@/shared/schemas'

/** The verdict in words, and beneath it what stood before beside what stands after. */
export function CompareResult({ path, isVisit }: { path: string; isVisit: boolean }) {
  const { units } = useUnits()
  const { data, error, mutate } = useApi<Comparison>(path)
  if (error) return <Trouble title={error.message} retry={() => void mutate()} />
  if (!data) return <Loading what="both sides" />
  return (
    <div aria-live="polite">
      <p className="mt-4 max-w-[44em] text-lead">{compareFinding(data, isVisit)}</p>
      <div className="mt-3 overflow-x-auto" tabIndex={0} role="region" aria-label="Before and after">
        <table className="ruled max-w-[44em]">
          <thead>
            <tr>
              <th scope="col">
                <span className="sr-only">What</span>
              </th>
              <th scope="col">Before</th>
              <th scope="col">After</th>
            </tr>
          </thead>
          <tbody>
            {compareRows(data, units.vacuum).map((row) => (
              <tr key={row.name}>
                <th scope="row">{row.name}</th>
                <td className="figure whitespace-nowrap">{row.before}</td>
                <td className="figure whitespace-nowrap">{row.after}</td>
              </tr>
            ))}
          </tbody>
        </table>
      </div>
      <p className="datum mt-2">
        Holds that a flush cut short count as at least that long; interrupted ones and those while somebody
        worked on the system are left out. A leak moves r alone; pump or supply move R; a tank that fills
        moves r and R together and leaves K; the switch moves D.
      </p>
    </div>
  )
}
