'use client'

import { useState } from 'react'
import { QrCode } from '@/components/register/qr-code'
import { Button } from '@/components/ui/button'
import { Caution } from '@/components/ui/sheet-states'

/** A logger's key, the only time it can be seen: to copy, or to scan from the screen. */
export function KeyShown({ value, serial }: { value: string; serial: string }) {
  const [said, setSaid] = useState('')
  const copy = async () => {
    try {
      await navigator.clipboard.writeText(value)
      setSaid('Copied.')
    } catch {
      setSaid('This browser does not copy: mark the key and copy it by hand.')
    }
  }
  return (
    <section aria-label="The logger’s key" className="my-4 grid max-w-[46em] gap-4">
      <Caution>
        The key of {serial} is shown this once. Put it into the logger now; whoever has it can send readings
        in its name.
      </Caution>
      <div className="grid items-start gap-5 sm:grid-cols-[15rem_1fr]">
        <QrCode text={value} label={`Key of ${serial} as a QR code`} />
        <div className="grid gap-3">
          <code className="figure rounded-sm border border-field px-3 py-2 break-all" data-key>
            {value}
          </code>
          <div className="flex flex-wrap items-center gap-3">
            <Button weight="quiet" onClick={() => void copy()}>
              Copy the key
            </Button>
            <span role="status">{said}</span>
          </div>
          <p className="datum">
            Lost it before it was in? Roll the key on the logger’s page: another is shown, and this one is
            void.
          </p>
        </div>
      </div>
    </section>
  )
}
