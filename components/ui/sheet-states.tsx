import type { ReactNode } from 'react'
import { Button } from '@/components/ui/button'

/** Shown while something is on its way; says what, so that a slow line is not a blank sheet. */
export function Loading({ what }: { what: string }) {
  return (
    <p role="status" className="py-6 text-ink-2">
      <span className="live mr-2 inline-block h-2 w-6 bg-shoal align-middle" aria-hidden="true" />
      Reading {what} …
    </p>
  )
}

/** Nothing here yet, and what makes something appear. */
export function Empty({ title, children }: { title: string; children?: ReactNode }) {
  return (
    <div className="max-w-[38em] py-6">
      <p className="text-lead font-semibold">{title}</p>
      {children ? <div className="mt-1 text-ink-2">{children}</div> : null}
    </div>
  )
}

/** Something did not work: what, and what to do next. */
export function Trouble({
  title,
  children,
  retry,
}: {
  title: string
  children?: ReactNode
  retry?: () => void
}) {
  return (
    <div role="alert" className="my-4 max-w-[38em] border-l-2 border-attention pl-4">
      <p className="font-semibold">{title}</p>
      {children ? <div className="mt-1 text-ink-2">{children}</div> : null}
      {retry ? (
        <Button weight="plain" onClick={retry}>
          Try again
        </Button>
      ) : null}
    </div>
  )
}

/** A caution where the work can hurt someone: boxed, since it is about the thing being done now. */
export function Caution({ children }: { children: ReactNode }) {
  return <div className="max-w-[46em] rounded-sm bg-buff px-4 py-3 text-buff-ink">{children}</div>
}
