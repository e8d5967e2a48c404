'use client'

import { useSWRConfig } from 'swr'
import { z } from 'zod'
import { send } from '@/components/data/request'
import { useApi } from '@/components/data/use-api'
import { Choice } from '@/components/joining/choice'
import { EntryForm } from '@/components/joining/entry-form'
import { Field } from '@/components/ui/field'
import { Loading } from '@/components/ui/sheet-states'
import { SelectField } from '@/components/ui/select-field'
import { dateSchema, type FleetRow, type List } from '@/shared/schemas'

const schema = z.object({
  what: z.enum(['laid-up', 'back']),
  systems: z.array(z.string()).min(1, 'needs at least one boat'),
  until: z.union([z.literal(''), dateSchema]),
})

/** Lays one boat or many up at once, until a day if it is known, and takes it back. */
export function LayUpForm({ vessels }: { vessels: readonly { id: string; name: string }[] }) {
  const { mutate } = useSWRConfig()
  const rows = useApi<List<FleetRow>>('/api/vessels?limit=5000').data?.items
  if (!rows) return <Loading what="the systems" />
  const own = rows.filter((row) => vessels.some((vessel) => vessel.id === row.vesselId))
  return (
    <EntryForm
      schema={schema}
      defaults={{ what: 'laid-up', systems: own.map((row) => row.systemId), until: '' }}
      submit={async ({ what, systems, until }) => {
        const isLaidUp = what === 'laid-up'
        await send('PUT', '/api/statements', {
          systems,
          value: isLaidUp ? 'laid-up' : null,
          ...(isLaidUp && until !== '' ? { until: `${until}T12:00:00Z` } : {}),
        })
        await mutate((key) => typeof key === 'string' && /^\/api\/(vessels|systems)/.test(key))
      }}
      word="Save"
      busyWord="Saving …"
      doneWord="Saved."
      weight="quiet"
    >
      {({ register, watch }, wrong) => (
        <>
          <SelectField label="What" {...register('what')}>
            <option value="laid-up">Laid up from now on</option>
            <option value="back">In use again</option>
          </SelectField>
          <fieldset className="grid gap-2">
            <legend className="mb-2 font-semibold">Which</legend>
            {own.map((row) => (
              <Choice
                key={row.systemId}
                type="checkbox"
                value={row.systemId}
                label={row.systemName ? `${row.name}, ${row.systemName}` : row.name}
                hint={row.state === 'laid-up' ? 'laid up now' : undefined}
                {...register('systems')}
              />
            ))}
            {wrong('systems') ? <span className="text-note text-attention">{wrong('systems')}</span> : null}
          </fieldset>
          {watch('what') === 'laid-up' ? (
            <Field
              label="Until"
              hint="if you know"
              type="date"
              error={wrong('until')}
              {...register('until')}
            />
          ) : null}
        </>
      )}
    </EntryForm>
  )
}
