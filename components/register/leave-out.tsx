'use client'

import { useState } from 'react'
import { Button } from '@/components/ui/button'
import { Field } from '@/components/ui/field'

/** A check that cannot be done here is left out by name and with a reason, which stands in the record. */
export function LeaveOut({ busy, leave }: { busy: boolean; leave: (reason: string) => void }) {
  const [reason, setReason] = useState('')
  return (
    <details>
      <summary className="min-h-11 py-2">Leave this check out</summary>
      <form
        className="mt-2 grid max-w-[30em] gap-3"
        onSubmit={(event) => {
          event.preventDefault()
          leave(reason)
        }}
      >
        <Field
          label="Why it is left out"
          hint="stands in the record"
          value={reason}
          minLength={3}
          maxLength={500}
          required
          onChange={(event) => setReason(event.target.value)}
        />
        <div>
          <Button type="submit" weight="quiet" disabled={busy || reason.trim().length < 3}>
            Leave it out
          </Button>
        </div>
      </form>
    </details>
  )
}
