import type { ComponentProps, ReactNode } from 'react'

/** One of several, or one that may be ticked, as a whole line to touch. */
export function Choice({
  label,
  hint,
  type = 'radio',
  ...input
}: ComponentProps<'input'> & { label: ReactNode; hint?: ReactNode }) {
  // One of several is boxed, so that it is seen which was picked; of a list of ticks the ticks say enough.
  const shape =
    type === 'radio'
      ? 'rounded-sm border border-field px-3 has-checked:border-ink has-checked:inset-shadow-[0_-2px_0_var(--ink)]'
      : 'border-b border-line'
  return (
    <label
      className={`flex min-h-11 cursor-pointer items-start gap-3 py-2.5 has-disabled:cursor-default has-disabled:text-ink-2 ${shape}`}
    >
      <input type={type} className="mt-1 shrink-0 accent-(--act)" {...input} />
      <span>
        <span className="font-semibold">{label}</span>
        {hint ? <span className="datum block">{hint}</span> : null}
      </span>
    </label>
  )
}
