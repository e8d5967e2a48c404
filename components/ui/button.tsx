import Link from 'next/link'
import type { ComponentProps, ReactNode } from 'react'

type Weight = 'full' | 'quiet' | 'plain'

const SHAPE =
  'inline-flex min-h-11 items-center justify-center gap-2 rounded-sm px-4 py-2 font-semibold no-underline text-center'
const WEIGHTS: Record<Weight, string> = {
  full: 'bg-act text-water hover:brightness-110 disabled:bg-field disabled:text-water',
  quiet:
    'text-act inset-ring-[1.5px] inset-ring-act hover:bg-shallow disabled:text-ink-2 disabled:inset-ring-field',
  plain: 'text-act underline underline-offset-4 px-1 hover:decoration-2 disabled:text-ink-2',
}

/** `full` for the one thing to do here, `quiet` beside it, `plain` in running text. */
export function Button({
  weight = 'full',
  className = '',
  type = 'button',
  ...rest
}: ComponentProps<'button'> & { weight?: Weight }) {
  return <button type={type} className={`${SHAPE} ${WEIGHTS[weight]} ${className}`} {...rest} />
}

export function LinkButton({
  href,
  weight = 'full',
  children,
}: {
  href: string
  weight?: Weight
  children: ReactNode
}) {
  return (
    <Link href={href} className={`${SHAPE} ${WEIGHTS[weight]}`}>
      {children}
    </Link>
  )
}
