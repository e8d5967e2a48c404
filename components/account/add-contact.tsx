'use client'

import { useState } from 'react'
import { z } from 'zod'
import { send } from '@/components/data/request'
import { EntryForm } from '@/components/joining/entry-form'
import { Field } from '@/components/ui/field'
import { SelectField } from '@/components/ui/select-field'
import { emailSchema } from '@/shared/schemas'

const NUMBER = /^\+[1-9]\d{6,14}$/
/** Spaces, dashes and brackets are how people write numbers. */
const bare = (text: string): string => text.replace(/[\s().-]/g, '')

const schema = z
  .object({ channel: z.enum(['sms', 'email']), address: z.string().trim().min(1, 'is missing') })
  .superRefine(({ channel, address }, context) => {
    if (channel === 'email' && !emailSchema.safeParse(address).success)
      context.addIssue({ code: 'custom', path: ['address'], message: 'must look like name@boat.example' })
    if (channel === 'sms' && !NUMBER.test(bare(address)))
      context.addIssue({
        code: 'custom',
        path: ['address'],
        message: 'must start with + and the country code, as in +1 202 555 0143',
      })
  })

/** A number or a further mailbox; proven before anything is sent there. */
export function AddContact({ changed }: { changed: () => void }) {
  const [channel, setChannel] = useState('sms')
  return (
    <EntryForm
      schema={schema}
      defaults={{ channel: 'sms', address: '' }}
      submit={async (values) => {
        const address = values.channel === 'sms' ? bare(values.address) : values.address
        await send('POST', '/api/me/contacts', { channel: values.channel, address })
        changed()
      }}
      word={channel === 'sms' ? 'Send a code there' : 'Send a link there'}
      busyWord="Sending …"
      doneWord="Sent."
      weight="quiet"
    >
      {({ register }, wrong) => (
        <>
          <SelectField
            label="Kind"
            {...register('channel', { onChange: (event) => setChannel(String(event.target.value)) })}
          >
            <option value="sms">Telephone, by text</option>
            <option value="email">E-mail</option>
          </SelectField>
          <Field
            label={channel === 'sms' ? 'Number' : 'E-mail'}
            type={channel === 'sms' ? 'tel' : 'email'}
            hint={
              channel === 'sms'
                ? 'with + and the country code. Entering the code agrees to warnings by text; STOP ends them at any time.'
                : undefined
            }
            error={wrong('address')}
            {...register('address')}
          />
        </>
      )}
    </EntryForm>
  )
}
