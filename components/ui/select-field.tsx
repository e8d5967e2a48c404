import type { ComponentProps, ReactNode } from 'react'
import { useId } from 'react'

/** A labelled choice, with the look of `Field`. */
export function SelectField({
  label,
  hint,
  children,
  ...select
}: ComponentProps<'select'> & { label: ReactNode; hint?: ReactNode }) {
  const id = useId()
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
      <select
        id={id}
        aria-describedby={hint ? `${id}-hint` : undefined}
        className="min-h-11 w-full rounded-sm border border-field bg-water px-3 py-2"
        {...select}
      >
        {children}
      </select>
    </div>
  )
}
