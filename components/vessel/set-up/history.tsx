import { changeWords } from '@/components/vessel/set-up/history-words'
import { clock, dayOf, offsetAt, toMs } from '@/components/time'
import type { SetUp } from '@/shared/schemas'
import type { UnitChoice } from '@/shared/units'

/** Who changed what of the set-up, and when, the newest first. */
export function History({ setUp, units, now }: { setUp: SetUp; units: UnitChoice; now: number }) {
  if (setUp.history.length === 0)
    return <p className="text-ink-2">Nothing was changed since it was set up.</p>
  const moment = (at: string) => {
    const offset = offsetAt(setUp.offsets, toMs(at))
    return `${dayOf(at, offset, now)}, ${clock(at, offset)}`
  }
  return (
    <ol>
      {setUp.history.map((entry) => (
        <li
          key={entry.id}
          className="grid gap-x-6 border-b border-line py-2 first:pt-0 sm:grid-cols-[10em_minmax(0,1fr)]"
        >
          <time dateTime={entry.at} className="datum pt-0.5 tabular-nums">
            {moment(entry.at)}
          </time>
          <div className="min-w-0 break-words">
            <b className="font-semibold">{entry.who ?? 'Somebody of another shop'}</b>
            {entry.inForceFrom ? (
              <span className="text-ink-2">, counting from {moment(entry.inForceFrom)}</span>
            ) : null}
            <ul>
              {entry.changes.map((change) => (
                <li key={`${change.part ?? ''} ${change.field}`}>{changeWords(change, units)}</li>
              ))}
            </ul>
          </div>
        </li>
      ))}
    </ol>
  )
}
