'use client'

import { useState } from 'react'
import { z } from 'zod'
import { ContactSettingsForm } from '@/components/account/contact-settings-form'
import { ApiProblem, send } from '@/components/data/request'
import { EntryForm } from '@/components/joining/entry-form'
import { Section } from '@/components/joining/section'
import { Button } from '@/components/ui/button'
import { Field } from '@/components/ui/field'
import { Trouble } from '@/components/ui/sheet-states'
import { verifyContactSchema, type Contact } from '@/shared/schemas'

const codeSchema = z.object({ code: verifyContactSchema.shape.code })

/** One address: proven or not, what is told by it, and its way out. */
export function ContactSection({
  contact,
  isOwner,
  isShop,
  isAccount,
  changed,
}: {
  contact: Contact
  isOwner: boolean
  isShop: boolean
  isAccount: boolean
  changed: () => void
}) {
  const [trouble, setTrouble] = useState<string | null>(null)
  const [said, setSaid] = useState('')
  const path = `/api/me/contacts/${contact.id}`
  const act = async (work: () => Promise<unknown>, word = '') => {
    setTrouble(null)
    setSaid('')
    try {
      await work()
      setSaid(word)
      changed()
    } catch (error) {
      setTrouble(error instanceof ApiProblem ? error.message : 'That did not work. Try again.')
    }
  }
  const isText = contact.channel === 'sms'
  return (
    <Section title={contact.address} about={standing(contact, isAccount)}>
      {contact.verifiedAt === null ? (
        <div className="grid gap-3">
          {isText ? (
            <EntryForm
              schema={codeSchema}
              defaults={{ code: '' }}
              submit={async (values) => {
                await send('POST', `${path}/verify`, values)
                changed()
              }}
              word="Confirm the number"
              busyWord="Confirming …"
            >
              {({ register }, wrong) => (
                <Field
                  label="Six digits from the text"
                  inputMode="numeric"
                  autoComplete="one-time-code"
                  error={wrong('code')}
                  {...register('code')}
                />
              )}
            </EntryForm>
          ) : (
            <p>Open the link in the mail that was sent there.</p>
          )}
          <Button
            weight="plain"
            className="justify-self-start"
            onClick={() => void act(() => send('POST', `${path}/proof`), 'Sent.')}
          >
            Send {isText ? 'a new code' : 'the link again'}
          </Button>
        </div>
      ) : contact.stoppedAt === null ? (
        <ContactSettingsForm contact={contact} isOwner={isOwner} isShop={isShop} changed={changed} />
      ) : (
        <Button weight="quiet" onClick={() => void act(() => send('PATCH', path, { stopped: false }))}>
          Tell me by this address again
        </Button>
      )}
      <p role="status" className="text-ink-2 empty:hidden">
        {said}
      </p>
      {trouble ? <Trouble title={trouble} /> : null}
      <div className="mt-2 flex flex-wrap gap-x-6">
        {contact.verifiedAt !== null && contact.stoppedAt === null ? (
          <Button weight="plain" onClick={() => void act(() => send('PATCH', path, { stopped: true }))}>
            Send nothing more here
          </Button>
        ) : null}
        {isAccount ? null : (
          <Button weight="plain" onClick={() => void act(() => send('DELETE', path))}>
            Forget this {isText ? 'number' : 'address'}
          </Button>
        )}
      </div>
    </Section>
  )
}

function standing(contact: Contact, isAccount: boolean): string {
  const which = isAccount ? 'The e-mail of your account. ' : ''
  if (contact.verifiedAt === null) return `${which}Not proven yet: nothing is sent here.`
  if (contact.stoppedAt !== null) return `${which}Stopped: nothing is sent here.`
  return contact.channel === 'sms'
    ? 'Proven; you agreed to texts. Reply STOP to end them.'
    : `${which}Proven.`
}
