'use client'

import { z } from 'zod'
import { send } from '@/components/data/request'
import { useApi } from '@/components/data/use-api'
import { EntryForm } from '@/components/joining/entry-form'
import { Loading } from '@/components/ui/sheet-states'
import { SelectField } from '@/components/ui/select-field'
import { accessLevelSchema, type List, type Shop } from '@/shared/schemas'

const schema = z.object({ shopId: z.string().min(1, 'is missing'), level: accessLevelSchema })

/** Lets a further shop see the boat. */
export function LetIn({
  vesselId,
  inside,
  changed,
}: {
  vesselId: string
  inside: readonly string[]
  changed: () => void
}) {
  const shops = useApi<List<Shop>>('/api/shops').data?.items
  if (!shops) return <Loading what="the shops" />
  const outside = shops.filter((shop) => !inside.includes(shop.id))
  const [first] = outside
  if (first === undefined) return <p className="text-ink-2">Every shop on Middlewatch sees it already.</p>
  return (
    <EntryForm
      // A shop let in leaves the choice, so the form starts anew.
      key={inside.join()}
      schema={schema}
      defaults={{ shopId: first.id, level: 'figures' }}
      submit={async ({ shopId, level }) => {
        await send('PUT', `/api/vessels/${vesselId}/access/${shopId}`, { level })
        changed()
      }}
      word="Let the shop in"
      busyWord="Letting in …"
      weight="quiet"
    >
      {({ register }) => (
        <>
          <SelectField label="Shop" {...register('shopId')}>
            {outside.map((shop) => (
              <option key={shop.id} value={shop.id}>
                {shop.harbour ? `${shop.name}, ${shop.harbour}` : shop.name}
              </option>
            ))}
          </SelectField>
          <SelectField label="May see" {...register('level')}>
            <option value="figures">Leak figures</option>
            <option value="full">The full record</option>
          </SelectField>
        </>
      )}
    </EntryForm>
  )
}
