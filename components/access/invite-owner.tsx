'use client'

import { z } from 'zod'
import { send } from '@/components/data/request'
import { useApi } from '@/components/data/use-api'
import { EntryForm } from '@/components/joining/entry-form'
import { WaitingInvitations } from '@/components/people/waiting-invitations'
import { Field } from '@/components/ui/field'
import { emailSchema, type Invitation, type List } from '@/shared/schemas'

const schema = z.object({ email: emailSchema })

/** Invites somebody to own the boat, and shows whose answer is awaited. */
export function InviteOwner({ vesselId }: { vesselId: string }) {
  const { data, mutate } = useApi<List<Invitation>>(`/api/invitations?vessel=${vesselId}`)
  return (
    <div className="grid gap-5">
      <EntryForm
        schema={schema}
        defaults={{ email: '' }}
        submit={async ({ email }) => {
          await send('POST', '/api/invitations', { email, vesselId })
          await mutate()
        }}
        word="Invite as owner"
        busyWord="Sending …"
        doneWord="Sent."
        clears
        weight="quiet"
      >
        {({ register }, wrong) => (
          <Field label="E-mail of an owner" type="email" error={wrong('email')} {...register('email')} />
        )}
      </EntryForm>
      {data && data.items.length > 0 ? (
        <WaitingInvitations items={data.items} changed={() => void mutate()} />
      ) : null}
    </div>
  )
}
