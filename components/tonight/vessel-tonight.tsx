'use client'

import Link from 'next/link'
import { useApi } from '@/components/data/use-api'
import { isTroubled } from '@/components/states'
import { AboardControls } from '@/components/tonight/aboard-controls'
import { AskVisit } from '@/components/tonight/ask-visit'
import { Hush } from '@/components/tonight/hush'
import { OutOfUse } from '@/components/tonight/out-of-use'
import { SystemTonight } from '@/components/tonight/system-tonight'
import { Loading, Trouble } from '@/components/ui/sheet-states'
import type { Vessel } from '@/shared/schemas'

/** One boat on the owner's sheet: each of its systems tonight, then what the owner can say and ask. */
export function VesselTonight({ id, name }: { id: string; name: string }) {
  const { data: vessel, error, mutate } = useApi<Vessel>(`/api/vessels/${id}`)
  if (error) return <Trouble title={`${name}: ${error.message}`} retry={() => void mutate()} />
  if (!vessel) return <Loading what={name} />
  return (
    <article aria-label={name} className="border-t border-line pt-7 pb-10 first:border-t-0 first:pt-0">
      <div className="grid gap-10">
        {vessel.systems.map((system) => (
          <SystemTonight key={system.id} vessel={vessel} system={system} />
        ))}
      </div>
      <div className="no-print mt-7 grid gap-x-16 gap-y-7 lg:grid-cols-[minmax(0,38rem)_minmax(0,34rem)]">
        <div className="grid content-start gap-4">
          <AskVisit vessel={vessel} folded={!vessel.systems.some((system) => isTroubled(system.state))} />
          <Hush vessel={vessel} />
        </div>
        <div className="grid content-start gap-6">
          {vessel.rights.setAboard ? <AboardControls vessel={vessel} /> : null}
          {vessel.rights.setStatement
            ? vessel.systems.map((system) => (
                <OutOfUse
                  key={system.id}
                  system={system}
                  title={vessel.systems.length > 1 ? `Out of use: ${system.name}` : 'Out of use'}
                />
              ))
            : null}
          <p>
            <Link href={`/vessels/${vessel.id}`}>The whole record of {vessel.name}</Link>
          </p>
        </div>
      </div>
    </article>
  )
}
