'use client'

import { useState } from 'react'
import { z } from 'zod'
import { send } from '@/components/data/request'
import { EntryForm } from '@/components/joining/entry-form'
import { Section } from '@/components/joining/section'
import { Button } from '@/components/ui/button'
import { Field } from '@/components/ui/field'
import {
  beginSecondFactorSchema,
  confirmSecondFactorSchema,
  endSecondFactorSchema,
  type BegunSecondFactor,
  type SecondFactor,
} from '@/shared/schemas'

const codesSchema = z.object({ recoveryCodes: z.array(z.string()) })

/** A code from one's own device besides the password: turned on, renewed and off again. */
export function SecondFactorSection({ factor, changed }: { factor: SecondFactor; changed: () => void }) {
  const [codes, setCodes] = useState<readonly string[] | null>(null)
  const show = (answer: unknown) => setCodes(codesSchema.parse(answer).recoveryCodes)
  return (
    <Section
      title="Second factor"
      about="A code from an authenticator app on your phone, asked besides the password. A password that leaks is then not enough."
    >
      {codes !== null ? (
        <RecoveryCodes
          codes={codes}
          kept={() => {
            setCodes(null)
            changed()
          }}
        />
      ) : factor.on ? (
        <On factor={factor} changed={changed} show={show} />
      ) : (
        <Off show={show} />
      )}
    </Section>
  )
}

function Off({ show }: { show: (answer: unknown) => void }) {
  const [begun, setBegun] = useState<BegunSecondFactor | null>(null)
  if (begun === null)
    return (
      <EntryForm
        schema={beginSecondFactorSchema}
        defaults={{ password: '' }}
        submit={async (values) => {
          setBegun(await send<BegunSecondFactor>('POST', '/api/me/second-factor', values))
        }}
        word="Turn it on"
        busyWord="Beginning …"
        weight="quiet"
      >
        {({ register }, wrong) => (
          <Field
            label="Your password"
            type="password"
            autoComplete="current-password"
            error={wrong('password')}
            {...register('password')}
          />
        )}
      </EntryForm>
    )
  return (
    <div className="grid gap-4">
      <p>Scan this with the app, or type the key into it. Then write the six digits that it shows.</p>
      {/* eslint-disable-next-line @next/next/no-img-element -- a data address needs no optimising */}
      <img src={begun.qr} alt="QR code of the key below" width={200} height={200} className="bg-[#fff]" />
      <p>
        <span className="datum block">Key</span>
        <span className="figure break-all">{begun.secret.replace(/(.{4})/g, '$1 ').trim()}</span>
      </p>
      <EntryForm
        schema={confirmSecondFactorSchema}
        defaults={{ code: '' }}
        submit={async (values) => show(await send('PUT', '/api/me/second-factor', values))}
        word="Confirm"
        busyWord="Confirming …"
      >
        {({ register }, wrong) => (
          <Field
            label="Six digits"
            inputMode="numeric"
            autoComplete="one-time-code"
            error={wrong('code')}
            {...register('code')}
          />
        )}
      </EntryForm>
    </div>
  )
}

function RecoveryCodes({ codes, kept }: { codes: readonly string[]; kept: () => void }) {
  return (
    <div role="status" className="grid gap-3">
      <p className="max-w-[38em]">
        <b className="font-semibold">It is on.</b> Keep these recovery codes away from the phone, on paper for
        instance: each signs you in once when the phone is lost. They are not shown again.
      </p>
      <ol className="figure grid gap-x-8 gap-y-1 sm:grid-cols-2 sm:max-w-[32em]">
        {codes.map((code) => (
          <li key={code}>{code}</li>
        ))}
      </ol>
      <div className="no-print flex gap-3">
        <Button onClick={kept}>I have kept them</Button>
        <Button weight="quiet" onClick={() => window.print()}>
          Print
        </Button>
      </div>
    </div>
  )
}

function On({
  factor,
  changed,
  show,
}: {
  factor: SecondFactor
  changed: () => void
  show: (answer: unknown) => void
}) {
  return (
    <div className="grid gap-4">
      <p>
        It is on. {factor.recoveryCodesLeft} recovery code{factor.recoveryCodesLeft === 1 ? ' is' : 's are'}{' '}
        left.
      </p>
      {(
        [
          ['New recovery codes', '/api/me/second-factor/recovery-codes', 'Make new codes'],
          ['Turn it off', '/api/me/second-factor/off', 'Turn it off'],
        ] as const
      ).map(([title, path, word]) => (
        <details key={path}>
          <summary>{title}</summary>
          <div className="mt-3">
            <EntryForm
              schema={endSecondFactorSchema}
              defaults={{ password: '', code: '' }}
              submit={async (values) => {
                const answer = await send('POST', path, values)
                if (path.endsWith('codes')) show(answer)
                else changed()
              }}
              word={word}
              busyWord="Working …"
              weight="quiet"
            >
              {({ register }, wrong) => (
                <>
                  <Field
                    label="Your password"
                    type="password"
                    autoComplete="current-password"
                    error={wrong('password')}
                    {...register('password')}
                  />
                  <Field
                    label="Code"
                    hint="six digits from the app, or a recovery code"
                    autoComplete="one-time-code"
                    error={wrong('code')}
                    {...register('code')}
                  />
                </>
              )}
            </EntryForm>
          </div>
        </details>
      ))}
    </div>
  )
}
