'use client'

import { signOut } from 'next-auth/react'
import { z } from 'zod'
import { send } from '@/components/data/request'
import { Choice } from '@/components/joining/choice'
import { loadWhole } from '@/components/joining/load-whole'
import { EntryForm } from '@/components/joining/entry-form'
import { trySignIn } from '@/components/sign-in/sign-in-form'
import { Button, LinkButton } from '@/components/ui/button'
import { Field } from '@/components/ui/field'
import type { InvitationTo } from '@/shared/schemas'
import { newPasswordSchema } from '@/shared/schemas'

const keepShop = z.enum(['figures', 'full', 'none'])
const knownSchema = z.object({ keepShop })
const newSchema = knownSchema.extend({
  name: z.string().trim().min(1, 'is missing').max(120),
  password: newPasswordSchema,
})

const LEVELS = [
  [
    'figures',
    'Leak figures',
    'State, hold time, runs by leak, trend and notices. During a visit also the full record.',
  ],
  ['full', 'The full record', 'Also the vacuum minute by minute, flushes, and whether anybody is aboard.'],
  ['none', 'Nothing', 'You watch alone; a shop can be let in later.'],
] as const

type Props = { token: string; invitation: InvitationTo; signedInAs: string | null }

/** Accepts an invitation: opening the link only showed what it is. */
export function InvitationForm({ token, invitation, signedInAs }: Props) {
  const { email } = invitation
  if (signedInAs !== null && signedInAs.toLowerCase() !== email.toLowerCase())
    return (
      <div className="max-w-[38em]">
        <p>
          You are signed in as <span className="break-all">{signedInAs}</span>, and the invitation is for{' '}
          <span className="break-all">{email}</span>. Sign out to accept it as the right person.
        </p>
        <Button className="mt-4" onClick={() => void signOut({ callbackUrl: `/invitation/${token}` })}>
          Sign out
        </Button>
      </div>
    )
  if (signedInAs === null && invitation.hasAccount)
    return (
      <div className="max-w-[38em]">
        <p className="mb-4">
          <span className="break-all">{email}</span> has an account. Sign in with it, and this page comes
          back.
        </p>
        <LinkButton href={`/sign-in?callbackUrl=${encodeURIComponent(`/invitation/${token}`)}`}>
          Sign in to accept
        </LinkButton>
      </div>
    )
  return signedInAs === null ? (
    <NewPerson token={token} invitation={invitation} />
  ) : (
    <KnownPerson token={token} invitation={invitation} />
  )
}

const goOn = (invitation: InvitationTo) => loadWhole(invitation.vesselName === null ? '/fleet' : '/tonight')

function KnownPerson({ token, invitation }: Omit<Props, 'signedInAs'>) {
  return (
    <EntryForm
      schema={knownSchema}
      defaults={{ keepShop: 'figures' }}
      submit={async (values) => {
        await send('POST', '/api/invitations/accept', { token, ...values })
        goOn(invitation)
      }}
      word="Accept"
      busyWord="Accepting …"
    >
      {({ register }) => <ShopSight invitation={invitation} field={register('keepShop')} />}
    </EntryForm>
  )
}

function NewPerson({ token, invitation }: Omit<Props, 'signedInAs'>) {
  const { email } = invitation
  return (
    <EntryForm
      schema={newSchema}
      defaults={{ keepShop: 'figures', name: '', password: '' }}
      submit={async (values) => {
        await send('POST', '/api/invitations/accept', { token, ...values })
        await trySignIn({ email, password: values.password })
        goOn(invitation)
      }}
      word="Accept"
      busyWord="Accepting …"
    >
      {({ register }, wrong) => (
        <>
          <p>
            An account is made for <span className="break-all font-semibold">{email}</span>.
          </p>
          <Field label="Your name" autoComplete="name" error={wrong('name')} {...register('name')} />
          <Field
            label="Choose a password"
            hint="At least 10 characters; several words are easier to keep than one strange one."
            type="password"
            autoComplete="new-password"
            error={wrong('password')}
            {...register('password')}
          />
          <ShopSight invitation={invitation} field={register('keepShop')} />
        </>
      )}
    </EntryForm>
  )
}

function ShopSight({ invitation, field }: { invitation: InvitationTo; field: { name: string } }) {
  if (invitation.vesselName === null || invitation.keptBy === null) return null
  return (
    <fieldset>
      <legend className="mb-2 font-semibold">What {invitation.keptBy} may see from now on</legend>
      <div className="grid gap-2">
        {LEVELS.map(([value, label, hint]) => (
          <Choice key={value} value={value} label={label} hint={hint} {...field} />
        ))}
      </div>
      <p className="datum mt-2">
        Flushes tell when people are aboard and awake. You can change this at any time.
      </p>
    </fieldset>
  )
}
