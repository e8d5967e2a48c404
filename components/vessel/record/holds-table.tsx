'use client'

import { useUnits } from '@/components/shell/units-context'
import { dayAndClock, offsetAt, type ZoneOffset } from '@/components/time'
import type { Ending, Hold } from '@/shared/schemas'
import { formatDuration, formatRateRange, rateFigure, UNKNOWN } from '@/shared/units'

const ENDING_WORDS: Record<Ending, string> = {
  leak: 'the pump, by itself',
  flush: 'a flush',
  unknown: 'not told',
  interrupted: 'data missing, or switched off',
  open: 'still holding',
}
const MOST = 200

/** The holds as figures, newest first. */
export function HoldsTable({
  holds,
  offsets,
  nowMs,
}: {
  holds: readonly Hold[]
  offsets: readonly ZoneOffset[]
  nowMs: number
}) {
  const { units } = useUnits()
  const newest = holds.slice(-MOST).reverse()
  return (
    <details className="mt-2">
      <summary>The holds as a table</summary>
      <div className="overflow-x-auto" tabIndex={0} role="region" aria-label="Holds">
        <table className="ruled mt-2 max-w-[56em]">
          <thead>
            <tr>
              <th scope="col">From</th>
              <th scope="col">Held</th>
              <th scope="col">Ended by</th>
              <th scope="col">Leak rate, {units.vacuum}/h</th>
            </tr>
          </thead>
          <tbody>
            {newest.map((hold) => {
              const offset = offsetAt(offsets, Date.parse(hold.startedAt))
              return (
                <tr key={hold.startedAt}>
                  <td className="figure">{dayAndClock(hold.startedAt, offset, nowMs)}</td>
                  <td className="figure">
                    {hold.ending === 'flush' || hold.ending === 'open' ? 'at least ' : ''}
                    {formatDuration(hold.durationSeconds)}
                  </td>
                  <td>{ENDING_WORDS[hold.ending]}</td>
                  <td className="figure">
                    {hold.leakRate
                      ? `${rateFigure(hold.leakRate.paPerHour, units.vacuum)} (${formatRateRange(
                          hold.leakRate.low,
                          hold.leakRate.high,
                          units.vacuum,
                        )})`
                      : UNKNOWN}
                  </td>
                </tr>
              )
            })}
          </tbody>
        </table>
      </div>
      {holds.length > MOST ? (
        <p className="datum mt-2">
          The newest {MOST} of {holds.length}.
        </p>
      ) : null}
    </details>
  )
}
