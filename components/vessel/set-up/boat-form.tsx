'use client'

import { useState } from 'react'
import { useController, type Control } from 'react-hook-form'
import { z } from 'zod'
import { send } from '@/components/data/request'
import { EntryForm } from '@/components/joining/entry-form'
import { useUnits } from '@/components/shell/units-context'
import { Field } from '@/components/ui/field'
import { neededFigure, shown } from '@/components/vessel/set-up/figures-typed'
import { useRefresh } from '@/components/vessel/set-up/use-refresh'
import { ZoneField } from '@/components/vessel/set-up/zone-field'
import { timeZoneSchema, wallTimeSchema, type Vessel } from '@/shared/schemas'

const FOOT_M = 0.3048
const LOWEST_M = -430
const HIGHEST_M = 5000

const schemaIn = (metres: number) =>
  z
    .object({
      name: z.string().trim().min(1, 'is missing').max(120),
      harbour: z.string().trim().max(120),
      berth: z.string().trim().max(120),
      timeZone: z.string().trim().min(1, 'is missing').pipe(timeZoneSchema),
      start: wallTimeSchema,
      end: wallTimeSchema,
      altitude: neededFigure(Math.ceil(LOWEST_M / metres), Math.floor(HIGHEST_M / metres)),
    })
    .refine((values) => values.start !== values.end, { path: ['end'], message: 'must differ from the start' })
type Values = z.input<ReturnType<typeof schemaIn>>
type Checked = z.output<ReturnType<typeof schemaIn>>

function Zone({ control, error }: { control: Control<Values, unknown, Checked>; error: string | undefined }) {
  const { field } = useController({ control, name: 'timeZone' })
  return <ZoneField label="Time zone" value={field.value} error={error} pick={field.onChange} />
}

/** Name, place, zone, quiet hours and altitude of the boat. They count from now on. */
export function BoatForm({ vessel, done }: { vessel: Vessel; done: () => void }) {
  const { units } = useUnits()
  const refresh = useRefresh()
  const [altitude] = useState(() =>
    units.volume === 'usGal' ? { name: 'ft', metres: FOOT_M } : { name: 'm', metres: 1 },
  )
  const [was] = useState<Values>(() => ({
    name: vessel.name,
    harbour: vessel.harbour ?? '',
    berth: vessel.berth ?? '',
    timeZone: vessel.timeZone,
    start: vessel.quietHours.start,
    end: vessel.quietHours.end,
    altitude: shown(vessel.altitudeM / altitude.metres, 0),
  }))
  return (
    <EntryForm
      schema={schemaIn(altitude.metres)}
      defaults={was}
      submit={async (values) => {
        const before = schemaIn(altitude.metres).parse(was)
        await send('PATCH', `/api/vessels/${vessel.id}`, {
          ...(values.name === before.name ? {} : { name: values.name }),
          ...(values.harbour === before.harbour ? {} : { harbour: values.harbour || null }),
          ...(values.berth === before.berth ? {} : { berth: values.berth || null }),
          ...(values.timeZone === before.timeZone ? {} : { timeZone: values.timeZone }),
          ...(values.start === before.start && values.end === before.end
            ? {}
            : { quietHours: { start: values.start, end: values.end } }),
          ...(values.altitude === before.altitude ? {} : { altitudeM: values.altitude * altitude.metres }),
        })
        await refresh()
        done()
      }}
      word="Save"
      busyWord="Saving …"
      doneWord="Saved."
    >
      {({ register, control }, wrong) => (
        <>
          <Field label="Name of the boat" error={wrong('name')} {...register('name')} />
          <div className="grid gap-4 sm:grid-cols-2">
            <Field label="Harbour" error={wrong('harbour')} {...register('harbour')} />
            <Field label="Berth" error={wrong('berth')} {...register('berth')} />
          </div>
          <Zone control={control} error={wrong('timeZone')} />
          <div className="grid grid-cols-2 gap-4">
            <Field
              label="Quiet from"
              type="time"
              error={wrong('start')}
              {...register('start', { deps: 'end' })}
            />
            <Field label="Quiet until" type="time" error={wrong('end')} {...register('end')} />
          </div>
          <Field
            label={`Altitude, ${altitude.name}`}
            hint="above the sea; where no barometer is fitted, the air pressure is taken from it"
            inputMode="decimal"
            error={wrong('altitude')}
            {...register('altitude')}
          />
        </>
      )}
    </EntryForm>
  )
}
