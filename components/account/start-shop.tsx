'use client'

import { send } from '@/components/data/request'
import { EntryForm } from '@/components/joining/entry-form'
import { loadWhole } from '@/components/joining/load-whole'
import { Field } from '@/components/ui/field'
import { openShopSchema } from '@/shared/schemas'

/** Brings a shop of one's own; whoever does is its first manager. */
export function StartShop() {
  return (
    <EntryForm
      schema={openShopSchema}
      defaults={{ name: '', harbour: '', timeZone: Intl.DateTimeFormat().resolvedOptions().timeZone }}
      submit={async (values) => {
        await send('POST', '/api/me/shops', values)
        loadWhole('/people')
      }}
      word="Start the shop"
      busyWord="Starting …"
    >
      {({ register }, wrong) => (
        <>
          <Field label="Name of the shop" error={wrong('name')} {...register('name')} />
          <Field label="Harbour" hint="optional" error={wrong('harbour')} {...register('harbour')} />
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
