'use client'

import Link from 'next/link'
import { useState } from 'react'
import { useNow } from '@/components/data/use-now'
import { RecordView } from '@/components/register/record-view'
import { isSettled, stateOfStep } from '@/components/register/steps'
import { useWork, type Acts } from '@/components/register/use-commissioning'
import { Button } from '@/components/ui/button'
import { Field } from '@/components/ui/field'
import { Trouble } from '@/components/ui/sheet-states'
import type { Commissioning } from '@/shared/schemas'

/** The record as it stands, and the hand under it. */
export function RecordStep({ commissioning, acts }: { commissioning: Commissioning; acts: Acts }) {
  const now = useNow()
  const [note, setNote] = useState('')
  const { busy, trouble, attempt } = useWork()
  const settled = commissioning.needed.every((kind) => isSettled(stateOfStep(commissioning, kind)))
  return (
    <div className="grid gap-6">
      <RecordView commissioning={commissioning} nowMs={now} />
      {commissioning.finishedAt !== null && commissioning.logger ? (
        <p className="flex flex-wrap gap-x-6">
          <Link
            href={`/loggers/${commissioning.logger.id}/commissioning`}
            className="inline-flex min-h-11 items-center"
          >
            The record to print or send
          </Link>
          {commissioning.system ? (
            <Link
              href={`/vessels/${commissioning.system.vesselId}?system=${commissioning.system.id}`}
              className="inline-flex min-h-11 items-center"
            >
              Go to {commissioning.system.vesselName}
            </Link>
          ) : null}
        </p>
      ) : (
        <form
          className="grid max-w-[34em] gap-4"
          onSubmit={(event) => {
            event.preventDefault()
            void attempt(() => acts.finish(note))
          }}
        >
          <p className="text-ink-2">
            Before you go: breaker on, water on, the pump stopped at its cut-out, each head flushed, no drips.
          </p>
          <Field
            label="Note"
            hint={
              settled ? 'optional' : 'Some checks have not passed: say why it is signed off all the same.'
            }
            value={note}
            maxLength={2000}
            onChange={(event) => setNote(event.target.value)}
          />
          {trouble ? <Trouble title={trouble} /> : null}
          <div>
            <Button
              type="submit"
              weight={settled ? 'full' : 'quiet'}
              disabled={busy || commissioning.fittedAt === null}
            >
              {settled ? 'Sign it off' : 'Sign it off with exceptions'}
            </Button>
          </div>
        </form>
      )}
    </div>
  )
}
