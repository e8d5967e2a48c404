'use client'

import { useEffect, useRef, useState, type ReactNode } from 'react'
import { Section } from '@/components/joining/section'
import { Button } from '@/components/ui/button'

/** A subject of the set-up: read by everybody, and by those who may, changed in place. */
export function Editable({
  title,
  about,
  word,
  may,
  form,
  children,
}: {
  title: string
  about?: ReactNode
  /** On the button: what is changed. */
  word: string
  may: boolean
  form: (done: () => void) => ReactNode
  children: ReactNode
}) {
  const [state, setState] = useState<'read' | 'change' | 'saved'>('read')
  // What was pressed goes away with the change of state, so the focus follows to what came in its place.
  const place = useRef<HTMLDivElement>(null)
  const shownAs = useRef(state)
  useEffect(() => {
    if (shownAs.current !== state) place.current?.focus()
    shownAs.current = state
  }, [state])
  return (
    <Section title={title} about={about}>
      {may && state === 'change' ? (
        <div key="change" ref={place} tabIndex={-1} className="outline-none">
          {form(() => setState('saved'))}
          <Button weight="plain" className="mt-2 -ml-4" onClick={() => setState('read')}>
            Leave as it was
          </Button>
        </div>
      ) : (
        <div key="read" ref={place} tabIndex={-1} className="outline-none">
          {children}
          {may ? (
            <div className="mt-4 flex flex-wrap items-center gap-4 print:hidden">
              <Button weight="quiet" onClick={() => setState('change')}>
                {word}
              </Button>
              <span role="status" className="text-ink-2">
                {state === 'saved' ? 'Saved.' : ''}
              </span>
            </div>
          ) : null}
        </div>
      )}
    </Section>
  )
}
