'use client'

import { useState } from 'react'
import { useWatch } from 'react-hook-form'
import { send } from '@/components/data/request'
import { EntryForm } from '@/components/joining/entry-form'
import { useUnits } from '@/components/shell/units-context'
import { PartRows, type PartsFormState } from '@/components/vessel/set-up/part-rows'
import {
  partsFormSchema,
  partsToSend,
  partValues,
  partValuesSchema,
  saidVolumeM3,
} from '@/components/vessel/set-up/part-values'
import { PlantDrawing } from '@/components/vessel/set-up/plant-drawing'
import { useRefresh } from '@/components/vessel/set-up/use-refresh'
import type { System } from '@/shared/schemas'
import type { UnitChoice } from '@/shared/units'

/** The drawing as it would be, while its parts are being entered. */
function Preview({ form, units }: { form: PartsFormState; units: UnitChoice }) {
  const parts = useWatch({ control: form.control, name: 'parts' })
  const drawn = parts.map((part) => {
    const checked = partValuesSchema.safeParse(part)
    return {
      key: part.key,
      kind: part.kind,
      name: part.name,
      parent: part.parent === '' ? null : part.parent,
      volumeM3: checked.success ? saidVolumeM3(checked.data, part.volume, units) : null,
    }
  })
  return <PlantDrawing parts={drawn} units={units} isNarrow />
}

/** Draws the system: parts added, renamed, led elsewhere, measured and removed; saved as a whole. */
export function PartsForm({ system, done }: { system: System; done: () => void }) {
  const { units: chosen } = useUnits()
  const refresh = useRefresh()
  // As the form was opened: another unit chosen meanwhile must not read what was typed as something else.
  const [units] = useState(chosen)
  const [defaults] = useState(() => ({ parts: partValues(system.parts, units) }))
  return (
    <EntryForm
      schema={partsFormSchema}
      defaults={defaults}
      submit={async ({ parts }) => {
        await send('PUT', `/api/systems/${system.id}/parts`, { parts: partsToSend(parts, units) })
        await refresh()
        done()
      }}
      word="Save the drawing"
      busyWord="Saving …"
      doneWord="Saved."
    >
      {(form) => (
        <>
          <Preview form={form} units={units} />
          <PartRows form={form} units={units} />
        </>
      )}
    </EntryForm>
  )
}
