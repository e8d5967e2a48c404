'use client'

import { useState } from 'react'
import { send } from '@/components/data/request'
import { useApi } from '@/components/data/use-api'
import { Choice } from '@/components/joining/choice'
import { EntryForm } from '@/components/joining/entry-form'
import { useUnits } from '@/components/shell/units-context'
import { Field } from '@/components/ui/field'
import { dayOnBoard, type Offsets } from '@/components/vessel/set-up/days'
import {
  figuresFormSchema,
  figuresToSend,
  figureValues,
  KINDS,
} from '@/components/vessel/set-up/figure-values'
import { useRefresh } from '@/components/vessel/set-up/use-refresh'
import { systemKindSchema, type Summary, type System } from '@/shared/schemas'
import { formatVacuum } from '@/shared/units'

/** The kind of system and its figures, in the reader's unit, from now on or from a day that has been. */
export function FiguresForm({
  system,
  offsets,
  now,
  offsetSeconds,
  done,
}: {
  system: System
  offsets: Offsets
  now: number
  offsetSeconds: number
  done: () => void
}) {
  const { units } = useUnits()
  const refresh = useRefresh()
  // As the form was opened: another unit chosen meanwhile must not read what was typed as something else.
  const [unit] = useState(units.vacuum)
  const [was] = useState(() => figureValues(system.settings, system.name, unit))
  const { data: summary } = useApi<Summary>(`/api/systems/${system.id}/summary`)
  const learned = (pa: number | null | undefined) =>
    pa == null
      ? 'empty to leave it to the record; not learned yet'
      : `empty to leave it to the record: ${formatVacuum(pa, unit)} now`
  const first = offsets[0]
  return (
    <EntryForm
      schema={figuresFormSchema(unit)}
      defaults={was}
      submit={async (values) => {
        const change = figuresToSend(values, was, unit, offsets)
        if (change !== null) await send('PUT', `/api/systems/${system.id}/settings`, change)
        await refresh()
        done()
      }}
      word="Save"
      busyWord="Saving …"
      doneWord="Saved."
    >
      {({ register, watch }, wrong) => (
        <>
          <fieldset className="grid gap-2">
            <legend className="mb-2 font-semibold">Kind of system</legend>
            {systemKindSchema.options.map((kind) => (
              <Choice
                key={kind}
                value={kind}
                label={KINDS[kind].word}
                hint={KINDS[kind].means}
                {...register('kind')}
              />
            ))}
          </fieldset>
          <Field
            label="Name of the system"
            hint="where a boat has several"
            error={wrong('name')}
            {...register('name')}
          />
          <div className="grid gap-4 sm:grid-cols-2">
            <Field
              label={`Pump stops at (cut-out), ${unit}`}
              hint={learned(summary?.cutOutPa)}
              inputMode="decimal"
              error={wrong('cutOut')}
              {...register('cutOut', { deps: 'cutIn' })}
            />
            <Field
              label={`Pump starts at (cut-in), ${unit}`}
              hint={learned(summary?.cutInPa)}
              inputMode="decimal"
              error={wrong('cutIn')}
              {...register('cutIn')}
            />
            <Field
              label="Limit, hours"
              hint="a shorter hold is told"
              inputMode="decimal"
              error={wrong('limitHours')}
              {...register('limitHours', { deps: 'aimHours' })}
            />
            <Field
              label="Aim, hours"
              hint="a night’s sleep: from here on it is tight"
              inputMode="decimal"
              error={wrong('aimHours')}
              {...register('aimHours')}
            />
            <Field
              label="Unheard after, hours"
              hint="silence of the logger that is told"
              inputMode="decimal"
              error={wrong('silenceHours')}
              {...register('silenceHours')}
            />
            <Field
              label="Pump current, A"
              hint="for the ampere-hours a day; empty if not known"
              inputMode="decimal"
              error={wrong('pumpAmps')}
              {...register('pumpAmps')}
            />
            <Field
              label="Low supply under, V"
              hint="empty to be told of none"
              inputMode="decimal"
              error={wrong('lowSupplyV')}
              {...register('lowSupplyV')}
            />
          </div>
          <fieldset className="grid gap-2">
            <legend className="mb-2 font-semibold">These figures count</legend>
            <Choice value="now" label="From now on" {...register('when')} />
            <Choice
              value="day"
              label="From a day that has been"
              hint="the record is worked out anew from that day’s start on board"
              {...register('when')}
            />
          </fieldset>
          {watch('when') === 'day' ? (
            <Field
              label="Day"
              type="date"
              max={dayOnBoard(now, offsetSeconds)}
              min={first ? dayOnBoard(Date.parse(String(first.from)), first.seconds) : undefined}
              error={wrong('day')}
              {...register('day')}
            />
          ) : null}
        </>
      )}
    </EntryForm>
  )
}
