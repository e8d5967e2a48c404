'use client'

import Link from 'next/link'
import { useState } from 'react'
import { z } from 'zod'
import { ApiProblem, send } from '@/components/data/request'
import { useApi } from '@/components/data/use-api'
import { UnitsForm } from '@/components/account/units-form'
import { EntryForm } from '@/components/joining/entry-form'
import { Section } from '@/components/joining/section'
import { Button } from '@/components/ui/button'
import { Field } from '@/components/ui/field'
import { Loading, Trouble } from '@/components/ui/sheet-states'
import { changeEmailSchema, type Me } from '@/shared/schemas'

const nameSchema = z.object({ name: z.string().trim().min(1, 'is missing').max(120) })

/** Who one is here: name, address, units, and the shops and boats one belongs to. */
export function YouSheet() {
  const { data: me, error, mutate } = useApi<Me>('/api/me')
  if (error) return <Trouble title={error.message} retry={() => void mutate()} />
  if (!me) return <Loading what="your account" />
  const changed = () => void mutate()
  return (
    <div className="pt-6">
      <p className="mb-6 max-w-[44em] text-finding tracking-[-0.015em]">{finding(me)}</p>
      <Section title="Units and time" about="How every figure is written for you, here and in messages.">
        <UnitsForm me={me} changed={changed} />
      </Section>
      <Section title="Name" about="As the shop, or the owner, sees it.">
        <EntryForm
          schema={nameSchema}
          defaults={{ name: me.person.name }}
          submit={async (values) => {
            await send('PATCH', '/api/me', values)
            changed()
          }}
          word="Save"
          busyWord="Saving …"
          doneWord="Saved."
        >
          {({ register }, wrong) => (
            <Field label="Name" autoComplete="name" error={wrong('name')} {...register('name')} />
          )}
        </EntryForm>
      </Section>
      <Section
        title="E-mail"
        about={`Now ${me.person.email}. A new one counts once its link is opened and confirmed.`}
      >
        <EntryForm
          schema={changeEmailSchema}
          defaults={{ email: '', password: '' }}
          submit={(values) => send('PUT', '/api/me/email', values)}
          word="Send a link to the new address"
          busyWord="Sending …"
          doneWord="Sent: open the link in that mail."
          clears
        >
          {({ register }, wrong) => (
            <>
              <Field
                label="New e-mail"
                type="email"
                autoComplete="email"
                error={wrong('email')}
                {...register('email')}
              />
              <Field
                label="Your password"
                type="password"
                autoComplete="current-password"
                error={wrong('password')}
                {...register('password')}
              />
            </>
          )}
        </EntryForm>
      </Section>
      <Section title="Shops and boats">
        <ul>
          {me.shops.map((shop) => (
            <ShopLine key={shop.id} shop={shop} changed={changed} />
          ))}
          {me.ownVessels.map((vessel) => (
            <li key={vessel.id} className="flex flex-wrap items-center gap-x-6 border-b border-line py-2">
              <span>
                <b className="font-semibold">{vessel.name}</b> <span className="text-ink-2">your own</span>
              </span>
              <Link href={`/vessels/${vessel.id}/access`} className="inline-flex min-h-11 items-center">
                Who can see her<span className="sr-only">: {vessel.name}</span>
              </Link>
            </li>
          ))}
        </ul>
        <p className="mt-3 flex flex-wrap gap-x-6">
          <Link href="/account/boat" className="inline-flex min-h-11 items-center">
            Set up a boat of your own
          </Link>
          <Link href="/account/shop" className="inline-flex min-h-11 items-center">
            Start a shop
          </Link>
        </p>
      </Section>
    </div>
  )
}

function finding(me: Me): string {
  const boats = me.ownVessels.length
  const owns = boats === 0 ? null : boats === 1 ? `own ${me.ownVessels[0]?.name}` : `own ${boats} boats`
  const works = me.shops.map((shop) => `work at ${shop.name} as ${shop.roles.join(' and ')}`)
  const all = [owns, ...works].filter((part) => part !== null)
  return all.length === 0 ? 'You own no boat here yet, and belong to no shop.' : `You ${all.join(', and ')}.`
}

function ShopLine({ shop, changed }: { shop: Me['shops'][number]; changed: () => void }) {
  const [asking, setAsking] = useState(false)
  const [trouble, setTrouble] = useState<string | null>(null)
  const leave = async () => {
    setTrouble(null)
    try {
      await send('DELETE', `/api/me/shops/${shop.id}`)
      changed()
    } catch (error) {
      setTrouble(error instanceof ApiProblem ? error.message : 'That did not work. Try again.')
    }
    setAsking(false)
  }
  return (
    <li className="border-b border-line py-2 first:pt-0">
      <span className="flex flex-wrap items-center gap-x-6">
        <span>
          <b className="font-semibold">{shop.name}</b>{' '}
          <span className="text-ink-2">{shop.roles.join(', ')}</span>
        </span>
        {asking ? (
          <>
            <Button onClick={() => void leave()}>Yes, I leave</Button>
            <Button weight="quiet" onClick={() => setAsking(false)}>
              No
            </Button>
          </>
        ) : (
          <Button weight="plain" onClick={() => setAsking(true)}>
            Leave<span className="sr-only"> {shop.name}</span>
          </Button>
        )}
      </span>
      {trouble ? <Trouble title={trouble} /> : null}
    </li>
  )
}
