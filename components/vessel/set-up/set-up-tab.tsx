'use client'

import { OwnerAwaited } from '@/components/access/owner-awaited'
import { useNow } from '@/components/data/use-now'
import { useUnits } from '@/components/shell/units-context'
import { Loading } from '@/components/ui/sheet-states'
import { PlantDrawing } from '@/components/vessel/set-up/plant-drawing'
import { setUpLines } from '@/components/vessel/set-up/set-up-lines'
import { useVessel } from '@/components/vessel/use-vessel'

/** How the system is set up, to read: its parts, its figures, its logger, and who may see it. */
export function SetUpTab({ id }: { id: string }) {
  const now = useNow(60_000)
  const { units } = useUnits()
  const { vessel, system } = useVessel(id)
  if (!vessel || !system) return <Loading what="the set-up" />
  const total = system.parts.reduce((sum, part) => sum + (part.volumeM3 ?? 0), 0)
  return (
    <div className="mt-6 grid gap-10">
      <div className="min-w-0">
        <h2 className="mb-3">The system as drawn</h2>
        {system.parts.length > 0 ? (
          <div className="overflow-x-auto" tabIndex={0} role="region" aria-label="The system as drawn">
            <div className="min-w-[40rem]">
              <PlantDrawing parts={system.parts} units={units} />
            </div>
          </div>
        ) : (
          <p className="text-ink-2">
            No parts are entered yet. Isolation needs them: heads, hoses, tank, switch, pump.
          </p>
        )}
      </div>
      <div className="grid items-start gap-x-16 gap-y-8 md:grid-cols-2 2xl:grid-cols-3">
        {setUpLines(vessel, system, units, total, now).map((group) => (
          <section key={group.title}>
            <h2 className="mb-1">{group.title}</h2>
            <table className="ruled">
              <tbody>
                {group.lines.map((line) => (
                  <tr key={line.name}>
                    <th scope="row" className="w-[44%]">
                      {line.name}
                    </th>
                    <td>{line.value}</td>
                  </tr>
                ))}
              </tbody>
            </table>
          </section>
        ))}
      </div>
      <OwnerAwaited vessel={vessel} />
    </div>
  )
}
