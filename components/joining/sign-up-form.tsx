'use client'

import { useState } from 'react'
import { z } from 'zod'
import { send } from '@/components/data/request'
import { Choice } from '@/components/joining/choice'
import { EntryForm } from '@/components/joining/entry-form'
import { Sent } from '@/components/joining/sent'
import { Field } from '@/components/ui/field'
import { signUpSchema } from '@/shared/schemas'

const ownerSchema = signUpSchema.pick({ email: true, name: true })
const shopSchema = ownerSchema.extend({
  shopName: z.string().trim().min(1, 'is missing').max(120),
  harbour: z.string().trim().max(120),
  timeZone: z.string().trim().min(1, 'is missing').max(64),
})

const browserZone = (): string => Intl.DateTimeFormat().resolvedOptions().timeZone

/** For an owner or for a shop with its first manager; the password is chosen once the address is proven. */
export function SignUpForm({ demo }: { demo: boolean }) {
  const [forShop, setForShop] = useState(false)
  const [sentTo, setSentTo] = useState<string | null>(null)
  if (sentTo !== null)
    return <Sent to={sentTo} what="Open its link to confirm the address and choose a password." demo={demo} />
  const ask = async (email: string, body: object) => {
    await send('POST', '/api/sign-up', body)
    setSentTo(email)
  }
  const common = { word: 'Send me the link', busyWord: 'Sending …' }
  return (
    <div className="grid max-w-[28em] gap-6">
      <fieldset>
        <legend className="mb-2 font-semibold">What is it for</legend>
        <div className="grid gap-2">
          <Choice
            name="for"
            checked={!forShop}
            onChange={() => setForShop(false)}
            label="A boat of my own"
            hint="Know before the night whether the pump will run. No shop is needed."
          />
          <Choice
            name="for"
            checked={forShop}
            onChange={() => setForShop(true)}
            label="A shop that keeps boats’ systems tight"
            hint="See every connected boat, worst first. You will be its first manager."
          />
        </div>
      </fieldset>
      {forShop ? (
        <EntryForm
          key="shop"
          schema={shopSchema}
          defaults={{ email: '', name: '', shopName: '', harbour: '', timeZone: browserZone() }}
          submit={({ email, name, shopName, harbour, timeZone }) =>
            ask(email, { email, name, shop: { name: shopName, harbour, timeZone } })
          }
          {...common}
        >
          {({ register }, wrong) => (
            <>
              <Field label="Name of the shop" error={wrong('shopName')} {...register('shopName')} />
              <Field label="Harbour" hint="optional" error={wrong('harbour')} {...register('harbour')} />
              <Field
                label="Time zone"
                hint="such as America/New_York; messages keep the shop’s hours"
                spellCheck={false}
                error={wrong('timeZone')}
                {...register('timeZone')}
              />
              <Field label="Your name" autoComplete="name" error={wrong('name')} {...register('name')} />
              <Field
                label="Your e-mail"
                type="email"
                autoComplete="email"
                error={wrong('email')}
                {...register('email')}
              />
            </>
          )}
        </EntryForm>
      ) : (
        <EntryForm
          key="owner"
          schema={ownerSchema}
          defaults={{ email: '', name: '' }}
          submit={(values) => ask(values.email, values)}
          {...common}
        >
          {({ register }, wrong) => (
            <>
              <Field label="Your name" autoComplete="name" error={wrong('name')} {...register('name')} />
              <Field
                label="Your e-mail"
                type="email"
                autoComplete="email"
                error={wrong('email')}
                {...register('email')}
              />
            </>
          )}
        </EntryForm>
      )}
    </div>
  )
}
