'use client'

import { send } from '@/components/data/request'
import { Choice } from '@/components/joining/choice'
import { EntryForm } from '@/components/joining/entry-form'
import { ROLES } from '@/components/people/words'
import { Field } from '@/components/ui/field'
import { emailSchema, roleSchema } from '@/shared/schemas'
import { z } from 'zod'

const schema = z.object({ email: emailSchema, role: roleSchema })

/** Invites somebody into the shop. */
export function InviteForm({ shopId, changed }: { shopId: string; changed: () => void }) {
  return (
    <EntryForm
      schema={schema}
      defaults={{ email: '', role: 'technician' }}
      submit={async (values) => {
        await send('POST', '/api/invitations', { shopId, ...values })
        changed()
      }}
      word="Send the invitation"
      busyWord="Sending …"
      doneWord="Sent."
      clears
    >
      {({ register }, wrong) => (
        <>
          <Field label="E-mail" type="email" error={wrong('email')} {...register('email')} />
          <fieldset>
            <legend className="mb-2 font-semibold">Role</legend>
            <div className="grid gap-2">
              {ROLES.map(({ role, word, does }) => (
                <Choice key={role} value={role} label={word} hint={does} {...register('role')} />
              ))}
            </div>
          </fieldset>
        </>
      )}
    </EntryForm>
  )
}
