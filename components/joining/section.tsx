import type { ReactNode } from 'react'

/** One subject of a sheet, ruled off above: its name and what it means on the left, what is done about it on the right. */
export function Section({
  title,
  about,
  children,
}: {
  title: string
  about?: ReactNode
  children: ReactNode
}) {
  return (
    <section className="grid gap-x-12 gap-y-3 border-t border-line py-6 md:grid-cols-[minmax(0,18em)_minmax(0,1fr)]">
      <div>
        <h2>{title}</h2>
        {about ? <p className="mt-1 text-ink-2">{about}</p> : null}
      </div>
      <div className="min-w-0">{children}</div>
    </section>
  )
}
