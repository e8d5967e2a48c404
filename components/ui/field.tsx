import type { ComponentProps, ReactNode } from 'react'
import { useId } from 'react'

/** A labelled field with its hint and what is wrong with it; the three are read together. */
export function Field({
  label,
  hint,
  error,
  ...input
}: ComponentProps<'input'> & { label: ReactNode; hint?: ReactNode; error?: string }) {
  const id = useId()
  const notes = [hint ? `${id}-hint` : '', error ? `${id}-error` : ''].filter(Boolean).join(' ')
  return (
    <div className="grid content-start gap-1.5">
      <label htmlFor={id} className="font-semibold">
        {label}
      </label>
      {hint ? (
        <span id={`${id}-hint`} className="datum">
          {hint}
        </span>
      ) : null}
      <input
        id={id}
        aria-invalid={error ? true : undefined}
        aria-describedby={notes || undefined}
        className="min-h-11 w-full rounded-sm border border-field bg-water px-3 py-2 aria-invalid:border-attention"
        {...input}
      />
      {error ? (
        <span id={`${id}-error`} className="text-note text-attention">
          {error}
        </span>
      ) : null}
    </div>
  )
}
