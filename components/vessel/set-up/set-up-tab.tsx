'use client'

import { OwnerAwaited } from '@/components/access/owner-awaited'
import { useApi } from '@/components/data/use-api'
import { useNow } from '@/components/data/use-now'
import { Section } from '@/components/joining/section'
import { useUnits } from '@/components/shell/units-context'
import { Loading, Trouble } from '@/components/ui/sheet-states'
import { BoatForm } from '@/components/vessel/set-up/boat-form'
import { Editable } from '@/components/vessel/set-up/editable'
import { FiguresForm } from '@/components/vessel/set-up/figures-form'
import { History } from '@/components/vessel/set-up/history'
import { LinesTable } from '@/components/vessel/set-up/lines-table'
import { PartsForm } from '@/components/vessel/set-up/parts-form'
import { PlantSheet } from '@/components/vessel/set-up/plant-sheet'
import { boatLines, figureLines, loggerLines } from '@/components/vessel/set-up/set-up-lines'
import { useVessel } from '@/components/vessel/use-vessel'
import type { SetUp, Summary } from '@/shared/schemas'

/** How the system is set up: its parts, figures, boat, logger and history; changed in place by those who may. */
export function SetUpTab({ id }: { id: string }) {
  const now = useNow(60_000)
  const { units } = useUnits()
  const { vessel, system } = useVessel(id)
  const systemPath = system ? `/api/systems/${system.id}` : null
  const { data: setUp, error, mutate } = useApi<SetUp>(systemPath && `${systemPath}/set-up`)
  const { data: summary } = useApi<Summary>(systemPath && `${systemPath}/summary`)
  if (error && !setUp) return <Trouble title={error.message} retry={() => void mutate()} />
  if (!vessel || !system || !setUp) return <Loading what="the set-up" />
  const { rights } = vessel
  return (
    <div className="pt-6" key={system.id}>
      <Editable
        title="The system as drawn"
        about="Heads lead through hoses to the tank. What is drawn here is what a visit can test."
        word={system.parts.length > 0 ? 'Change the drawing' : 'Draw the system'}
        may={rights.changeSettings}
        form={(done) => <PartsForm system={system} done={done} />}
      >
        <PlantSheet system={system} points={setUp.testPoints} units={units} />
      </Editable>
      <Editable
        title="Figures"
        about="What the record is judged by. Each change counts from a moment on; what was before stays as it was."
        word="Change the figures"
        may={rights.changeSettings}
        form={(done) => (
          <FiguresForm
            system={system}
            offsets={setUp.offsets}
            now={now}
            offsetSeconds={vessel.utcOffsetSeconds}
            done={done}
          />
        )}
      >
        <LinesTable lines={figureLines(system.settings, summary, units)} />
      </Editable>
      <Editable
        title="Boat and nights"
        about={
          rights.changeVessel
            ? 'Counts from now on.'
            : 'The owner changes these; the shop does while it keeps the boat.'
        }
        word="Change the boat"
        may={rights.changeVessel}
        form={(done) => <BoatForm vessel={vessel} done={done} />}
      >
        <LinesTable lines={boatLines(vessel)} />
      </Editable>
      <Section title="Logger">
        <LinesTable lines={loggerLines(vessel, system, now)} />
      </Section>
      <OwnerAwaited vessel={vessel} />
      <Section title="Changes" about="Newest first, times as on board.">
        <History setUp={setUp} units={units} now={now} />
      </Section>
    </div>
  )
}
