'use client'

import { send } from '@/components/data/request'
import { EntryForm } from '@/components/joining/entry-form'
import { useUnits } from '@/components/shell/units-context'
import { SelectField } from '@/components/ui/select-field'
import { unitChoiceSchema, type Me } from '@/shared/schemas'

/** The units of figures and the clock of times, kept with the account and in this browser. */
export function UnitsForm({ me, changed }: { me: Me; changed: () => void }) {
  const { setUnits } = useUnits()
  return (
    <EntryForm
      schema={unitChoiceSchema}
      defaults={me.units}
      submit={async (units) => {
        await send('PATCH', '/api/me', { units })
        setUnits({ vacuum: units.vacuum, temperature: units.temperature, volume: units.volume })
        changed()
      }}
      word="Save"
      busyWord="Saving …"
      doneWord="Saved."
    >
      {({ register }) => (
        <div className="grid gap-4 min-[26rem]:grid-cols-2">
          <SelectField label="Vacuum" {...register('vacuum')}>
            <option value="inHg">inHg</option>
            <option value="kPa">kPa</option>
            <option value="mbar">mbar</option>
          </SelectField>
          <SelectField label="Temperature" {...register('temperature')}>
            <option value="C">°C</option>
            <option value="F">°F</option>
          </SelectField>
          <SelectField label="Volume" {...register('volume')}>
            <option value="L">litres</option>
            <option value="usGal">US gallons</option>
            <option value="impGal">imperial gallons</option>
          </SelectField>
          <SelectField label="Clock" {...register('clock')}>
            <option value="24h">23:40</option>
            <option value="12h">11:40 pm</option>
          </SelectField>
        </div>
      )}
    </EntryForm>
  )
}
