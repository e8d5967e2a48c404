import type { ComponentProps, ReactNode } from 'react'

/** One of several, or one that may be ticked, as a whole line to touch. */
export function Choice({
  label,
  hint,
  type = 'radio',
  ...input
}: ComponentProps<'input'> & { label: ReactNode; hint?: ReactNode }) {
  return (
    <label className="flex min-h-11 cursor-pointer items-start gap-3 rounded-sm border border-field px-3 py-2.5 has-checked:border-ink has-checked:inset-shadow-[0_-2px_0_var(--ink)] has-disabled:cursor-default has-disabled:text-ink-2">
      <input type={type} className="mt-1 shrink-0 accent-(--act)" {...input} />
      <span>
        <span className="font-semibold">{label}</span>
        {hint ? <span className="datum block">{hint}</span> : null}
      </span>
    </label>
  )
}
