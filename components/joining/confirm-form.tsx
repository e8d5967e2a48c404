'use client'

import Link from 'next/link'
import { useState } from 'react'
import { z } from 'zod'
import { ApiProblem, send } from '@/components/data/request'
import { loadWhole } from '@/components/joining/load-whole'
import { EntryForm } from '@/components/joining/entry-form'
import { trySignIn } from '@/components/sign-in/sign-in-form'
import { Button } from '@/components/ui/button'
import { Field } from '@/components/ui/field'
import { Trouble } from '@/components/ui/sheet-states'
import type { Confirmation } from '@/shared/schemas'
import { newPasswordSchema } from '@/shared/schemas'

const passwordSchema = z.object({ password: newPasswordSchema })

/** Acts on the link of a mail: opening it only showed what it is for. */
export function ConfirmForm({ token, confirmation }: { token: string; confirmation: Confirmation }) {
  return confirmation.kind === 'sign-up' ? (
    <NewAccount token={token} confirmation={confirmation} />
  ) : (
    <NewAddress token={token} confirmation={confirmation} />
  )
}

function NewAccount({ token, confirmation }: { token: string; confirmation: Confirmation }) {
  const { email, shopName } = confirmation
  return (
    <>
      <p className="mb-5 max-w-[38em] text-finding tracking-[-0.015em]">
        {shopName === null
          ? 'One thing more: a password for the account of '
          : `One thing more before ${shopName} is on the watch: a password for the account of `}
        <span className="break-all">{email}</span>.
      </p>
      <EntryForm
        schema={passwordSchema}
        defaults={{ password: '' }}
        submit={async ({ password }) => {
          await send('POST', '/api/confirm-email', { token, password })
          await trySignIn({ email, password })
          loadWhole(shopName === null ? '/tonight' : '/people')
        }}
        word="Confirm and begin"
        busyWord="Making the account …"
      >
        {({ register }, wrong) => (
          <>
            <input type="email" autoComplete="username" defaultValue={email} readOnly hidden />
            <Field
              label="Password"
              hint="At least 10 characters; several words are easier to keep than one strange one."
              type="password"
              autoComplete="new-password"
              error={wrong('password')}
              {...register('password')}
            />
          </>
        )}
      </EntryForm>
    </>
  )
}

function NewAddress({ token, confirmation }: { token: string; confirmation: Confirmation }) {
  const [state, setState] = useState<'open' | 'busy' | 'done'>('open')
  const [trouble, setTrouble] = useState<string | null>(null)
  const isContact = confirmation.kind === 'contact'
  const act = async () => {
    setState('busy')
    setTrouble(null)
    try {
      await send('POST', '/api/confirm-email', { token })
      setState('done')
    } catch (error) {
      setTrouble(error instanceof ApiProblem ? error.message : 'That did not work. Try again.')
      setState('open')
    }
  }
  if (state === 'done')
    return (
      <div role="status">
        <p className="text-finding">
          {isContact ? 'Messages come to this address from now on.' : 'The account goes by this address now.'}
        </p>
        <p className="mt-3">
          <Link href={isContact ? '/account/messages' : '/account'}>Go to the account</Link>
        </p>
      </div>
    )
  return (
    <>
      <p className="mb-5 max-w-[38em] text-finding tracking-[-0.015em]">
        {isContact ? 'Shall Middlewatch send messages to ' : 'Shall your account go by '}
        <span className="break-all">{confirmation.email}</span>?
      </p>
      {trouble ? <Trouble title={trouble} /> : null}
      <Button disabled={state === 'busy'} onClick={() => void act()}>
        {state === 'busy' ? 'Confirming …' : 'Yes, confirm the address'}
      </Button>
    </>
  )
}
