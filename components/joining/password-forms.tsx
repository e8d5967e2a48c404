'use client'

import Link from 'next/link'
import { useState } from 'react'
import { send } from '@/components/data/request'
import { EntryForm } from '@/components/joining/entry-form'
import { Sent } from '@/components/joining/sent'
import { Field } from '@/components/ui/field'
import { forgotPasswordSchema, resetPasswordSchema } from '@/shared/schemas'

/** Has a link for a new password sent. */
export function ForgotPasswordForm({ demo }: { demo: boolean }) {
  const [sentTo, setSentTo] = useState<string | null>(null)
  if (sentTo !== null)
    return (
      <Sent
        to={sentTo}
        what="If an account goes by this address, its link lets you choose a new password."
        demo={demo}
      />
    )
  return (
    <EntryForm
      schema={forgotPasswordSchema}
      defaults={{ email: '' }}
      submit={async (values) => {
        await send('POST', '/api/password/forgot', values)
        setSentTo(values.email)
      }}
      word="Send me a link"
      busyWord="Sending …"
    >
      {({ register }, wrong) => (
        <Field
          label="E-mail of the account"
          type="email"
          autoComplete="username"
          error={wrong('email')}
          {...register('email')}
        />
      )}
    </EntryForm>
  )
}

/** Chooses the new password by the link of the mail. */
export function ResetPasswordForm({ token }: { token: string }) {
  const [done, setDone] = useState(false)
  if (done)
    return (
      <div role="status">
        <p className="text-finding">The new password is set, and every device is signed out.</p>
        <p className="mt-3">
          <Link href="/sign-in">Sign in with it</Link>
        </p>
      </div>
    )
  return (
    <EntryForm
      schema={resetPasswordSchema.pick({ password: true })}
      defaults={{ password: '' }}
      submit={async ({ password }) => {
        await send('POST', '/api/password/reset', { token, password })
        setDone(true)
      }}
      word="Set the password"
      busyWord="Setting …"
    >
      {({ register }, wrong) => (
        <Field
          label="New password"
          hint="At least 10 characters; several words are easier to keep than one strange one."
          type="password"
          autoComplete="new-password"
          error={wrong('password')}
          {...register('password')}
        />
      )}
    </EntryForm>
  )
}
