import type { ReactNode } from 'react'

/**
 * Opens every sheet as a chart does: its title, and in italics what the numbers are measured in and where
 * the times are; on the right what it was drawn from.
 */
export function TitleBlock({
  title,
  datum,
  aside,
}: {
  title: ReactNode
  datum?: ReactNode
  aside?: readonly ReactNode[]
}) {
  return (
    <div className="sheet grid items-end gap-x-8 gap-y-1 pt-7 pb-4 md:grid-cols-[1fr_auto]">
      <div>
        <h1>{title}</h1>
        {datum ? <p className="datum mt-1.5 italic">{datum}</p> : null}
      </div>
      {aside && aside.length > 0 ? (
        <ul className="datum grid gap-0.5 md:justify-items-end">
          {aside.map((line, index) => (
            <li key={index}>{line}</li>
          ))}
        </ul>
      ) : null}
    </div>
  )
}
