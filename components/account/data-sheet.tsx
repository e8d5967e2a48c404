'use client'

import { signOut } from 'next-auth/react'
import { send } from '@/components/data/request'
import { useApi } from '@/components/data/use-api'
import { EntryForm } from '@/components/joining/entry-form'
import { Section } from '@/components/joining/section'
import { Field } from '@/components/ui/field'
import { Loading, Trouble } from '@/components/ui/sheet-states'
import { deleteAccountSchema, type Deletion } from '@/shared/schemas'

const names = (items: readonly { name: string }[]): string => items.map((item) => item.name).join(', ')

/** Takes one's data away as a file, or ends the account. */
export function DataSheet() {
  const { data, error, mutate } = useApi<Deletion>('/api/account/delete')
  if (error) return <Trouble title={error.message} retry={() => void mutate()} />
  if (!data) return <Loading what="what is kept of you" />
  return (
    <div className="pt-6">
      <p className="mb-6 max-w-[44em] text-finding tracking-[-0.015em]">
        What is kept of you is yours: take it away as a file, or have it deleted.
      </p>
      <Section
        title="Take your data away"
        about="Everything kept of you and of your boats but the single readings, as one JSON file."
      >
        <a
          href="/api/me/export"
          download="middlewatch-account.json"
          className="inline-flex min-h-11 items-center justify-center rounded-sm px-4 py-2 font-semibold text-act no-underline inset-ring-[1.5px] inset-ring-act hover:bg-shallow"
        >
          Download
        </a>
      </Section>
      <Section title="Delete the account" about="For good: there is no way back from it.">
        <ul className="mb-5 max-w-[38em]">
          {consequences(data).map((line) => (
            <li key={line} className="border-b border-line py-2 first:pt-0">
              {line}
            </li>
          ))}
        </ul>
        {data.blocked.length > 0 ? (
          <Trouble title={`You are the last manager of ${names(data.blocked)}.`}>
            Make somebody else a manager first, under People.
          </Trouble>
        ) : (
          <EntryForm
            schema={deleteAccountSchema}
            defaults={{ email: '', password: '' }}
            submit={async (values) => {
              await send('POST', '/api/account/delete', values)
              await signOut({ callbackUrl: '/' })
            }}
            word="Delete my account for good"
            busyWord="Deleting …"
            weight="quiet"
          >
            {({ register }, wrong) => (
              <>
                <Field
                  label="The e-mail of your account, to say that you mean it"
                  type="email"
                  autoComplete="off"
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
        )}
      </Section>
    </div>
  )
}

function consequences(deletion: Deletion): string[] {
  const { vessels, shared, closing, visitsKept } = deletion
  return [
    'Your name, addresses, sessions and the text of messages to you go.',
    ...(vessels.length > 0
      ? [
          `The record of ${names(vessels)} goes, loggers stop being heard, and no shop sees ${vessels.length === 1 ? 'her' : 'them'} any more.`,
        ]
      : []),
    ...(visitsKept > 0
      ? [
          `Shops keep the ${visitsKept} visit${visitsKept === 1 ? '' : 's'} they did, with tests, parts and reports.`,
        ]
      : []),
    ...(shared.length > 0
      ? [`${names(shared)} stay${shared.length === 1 ? 's' : ''} with the other owners.`]
      : []),
    ...(closing.length > 0 ? [`${names(closing)} closes: you are the only one in it.`] : []),
  ]
}
