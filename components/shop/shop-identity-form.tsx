'use client'

import { z } from 'zod'
import { send } from '@/components/data/request'
import { EntryForm } from '@/components/joining/entry-form'
import { Field } from '@/components/ui/field'
import type { ShopWhole } from '@/shared/schemas'

const schema = z.object({
  name: z.string().trim().min(1, 'is missing').max(120),
  harbour: z.string().trim().max(120),
  timeZone: z.string().trim().min(1, 'is missing').max(64),
})

export function ShopIdentityForm({ shop, changed }: { shop: ShopWhole; changed: () => void }) {
  return (
    <EntryForm
      schema={schema}
      defaults={{ name: shop.name, harbour: shop.harbour ?? '', timeZone: shop.timeZone }}
      submit={async (values) => {
        await send('PATCH', `/api/shops/${shop.id}`, { ...values, harbour: values.harbour || null })
        changed()
      }}
      word="Save"
      busyWord="Saving …"
      doneWord="Saved."
    >
      {({ register }, wrong) => (
        <>
          <Field label="Name" error={wrong('name')} {...register('name')} />
          <Field label="Harbour" error={wrong('harbour')} {...register('harbour')} />
          <Field
            label="Time zone"
            hint="such as America/New_York"
            spellCheck={false}
            error={wrong('timeZone')}
            {...register('timeZone')}
          />
        </>
      )}
    </EntryForm>
  )
}
