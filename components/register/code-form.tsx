'use client'

import { useCallback, useState } from 'react'
import { Scan } from '@/components/register/scan'
import { useWork } from '@/components/register/use-commissioning'
import { Button } from '@/components/ui/button'
import { Field } from '@/components/ui/field'
import { Trouble } from '@/components/ui/sheet-states'

/** The code that a logger shows: typed always, scanned where the browser can. */
export function CodeForm({
  initial = '',
  word,
  take,
}: {
  initial?: string
  word: string
  take: (code: string) => Promise<unknown>
}) {
  const [code, setCode] = useState(initial)
  const { busy, trouble, attempt } = useWork()
  const scanned = useCallback((found: string) => setCode(found), [])
  return (
    <form
      className="grid max-w-[26em] gap-4"
      onSubmit={(event) => {
        event.preventDefault()
        void attempt(() => take(code))
      }}
    >
      <Field
        label="Code on the logger"
        hint="Eight letters, such as WDJB-MJHT. It is good for a quarter of an hour; a logger that asks again shows another."
        name="code"
        value={code}
        onChange={(event) => setCode(event.target.value)}
        autoComplete="off"
        autoCapitalize="characters"
        spellCheck={false}
        required
        minLength={8}
        className="figure min-h-14 w-full rounded-sm border border-field bg-water px-3 text-finding tracking-[0.08em] uppercase"
      />
      <Scan onCode={scanned} />
      {trouble ? <Trouble title={trouble} /> : null}
      <div>
        <Button type="submit" disabled={busy || code.trim().length < 8}>
          {busy ? 'Looking …' : word}
        </Button>
      </div>
    </form>
  )
}
