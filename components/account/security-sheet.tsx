'use client'

import { SecondFactorSection } from '@/components/account/second-factor'
import { Sessions } from '@/components/account/sessions'
import { send } from '@/components/data/request'
import { useApi } from '@/components/data/use-api'
import { EntryForm } from '@/components/joining/entry-form'
import { Section } from '@/components/joining/section'
import { Field } from '@/components/ui/field'
import { Loading, Trouble } from '@/components/ui/sheet-states'
import { changePasswordSchema, type List, type SecondFactor, type Session } from '@/shared/schemas'

/** Password, second factor and where one is signed in. */
export function SecuritySheet() {
  const factor = useApi<SecondFactor>('/api/me/second-factor')
  const sessions = useApi<List<Session>>('/api/me/sessions')
  const error = factor.error ?? sessions.error
  if (error) return <Trouble title={error.message} retry={() => void sessions.mutate()} />
  if (!factor.data || !sessions.data) return <Loading what="how you sign in" />
  const others = sessions.data.items.length - 1
  return (
    <div className="pt-6">
      <p className="mb-6 max-w-[44em] text-finding tracking-[-0.015em]">
        {factor.data.on
          ? 'Signing in asks for your password and a code'
          : 'Signing in asks for your password alone'}
        {others === 0
          ? '; you are signed in nowhere else.'
          : `; you are signed in on ${others} other device${others === 1 ? '' : 's'}.`}
      </p>
      <Section title="Password" about="Changing it signs every other device out.">
        <EntryForm
          schema={changePasswordSchema}
          defaults={{ current: '', next: '' }}
          submit={async (values) => {
            await send('PUT', '/api/me/password', values)
            await sessions.mutate()
          }}
          word="Change the password"
          busyWord="Changing …"
          doneWord="Changed."
          clears
        >
          {({ register }, wrong) => (
            <>
              <Field
                label="Password now"
                type="password"
                autoComplete="current-password"
                error={wrong('current')}
                {...register('current')}
              />
              <Field
                label="New password"
                hint="At least 10 characters; several words are easier to keep than one strange one."
                type="password"
                autoComplete="new-password"
                error={wrong('next')}
                {...register('next')}
              />
            </>
          )}
        </EntryForm>
      </Section>
      <SecondFactorSection
        factor={factor.data}
        changed={() => {
          void factor.mutate()
          void sessions.mutate()
        }}
      />
      <Section title="Where you are signed in" about="A device signed out is out at once.">
        <Sessions items={sessions.data.items} changed={() => void sessions.mutate()} />
      </Section>
    </div>
  )
}
