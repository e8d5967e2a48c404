'use client'

import { useRouter } from 'next/navigation'
import { useId, useState } from 'react'
import { send } from '@/components/data/request'
import { CodeForm } from '@/components/register/code-form'
import { nextStep, stepHref } from '@/components/register/steps'
import { useWork } from '@/components/register/use-commissioning'
import { Button } from '@/components/ui/button'
import { Field } from '@/components/ui/field'
import { Trouble } from '@/components/ui/sheet-states'
import type { Commissioning, StartCommissioning } from '@/shared/schemas'

export interface Beforehand {
  serial?: string | undefined
  systemId?: string | undefined
  /** The logger is in stock or moves: it keeps its key. */
  known?: boolean
}

/** Begins a registration and goes to its next step. */
export function useStart() {
  const router = useRouter()
  return async (start: StartCommissioning) => {
    const made = await send<Commissioning>('POST', '/api/commissionings', start)
    if (made !== null) router.push(stepHref(made.id, nextStep(made)))
  }
}

/** Either the logger shows a code and fetches its key itself, or a key is carried to it. */
export function StartForm({ code, beforehand = {} }: { code?: string; beforehand?: Beforehand }) {
  const start = useStart()
  const [way, setWay] = useState<'claim' | 'key'>(beforehand.serial === undefined ? 'claim' : 'key')
  const name = useId()
  return (
    <div className="grid gap-5">
      <fieldset>
        <legend className="mb-1 font-semibold">How does the logger come by its key?</legend>
        {(
          [
            ['claim', 'It shows a code, and fetches the key itself'],
            ['key', 'It shows no code: a key is copied or scanned into it'],
          ] as const
        ).map(([value, words]) => (
          <label key={value} className="flex min-h-11 items-center gap-3">
            <input
              type="radio"
              name={name}
              value={value}
              checked={way === value}
              onChange={() => setWay(value)}
              className="size-5 accent-act"
            />
            {words}
          </label>
        ))}
      </fieldset>
      {way === 'claim' ? (
        <CodeForm
          key={code ?? ''}
          initial={code ?? ''}
          word="Go on with this logger"
          take={(userCode) => start({ way: 'claim', userCode, systemId: beforehand.systemId })}
        />
      ) : (
        <SerialForm beforehand={beforehand} start={start} />
      )}
    </div>
  )
}

function SerialForm({
  beforehand,
  start,
}: {
  beforehand: Beforehand
  start: (start: StartCommissioning) => Promise<void>
}) {
  const [serial, setSerial] = useState(beforehand.serial ?? '')
  const { busy, trouble, attempt } = useWork()
  return (
    <form
      className="grid max-w-[26em] gap-4"
      onSubmit={(event) => {
        event.preventDefault()
        void attempt(() =>
          start({
            way: beforehand.known ? 'known' : 'key',
            serial: serial.trim(),
            systemId: beforehand.systemId,
          }),
        )
      }}
    >
      <Field
        label="Serial of the logger"
        hint="As on its label: letters, digits, dot, dash and underscore."
        name="serial"
        value={serial}
        onChange={(event) => setSerial(event.target.value)}
        autoComplete="off"
        spellCheck={false}
        required
        minLength={2}
        maxLength={64}
      />
      {trouble ? <Trouble title={trouble} /> : null}
      <div>
        <Button type="submit" disabled={busy || serial.trim().length < 2}>
          {busy ? 'Beginning …' : 'Go on with this logger'}
        </Button>
      </div>
    </form>
  )
}
