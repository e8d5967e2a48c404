import { dayAndClock, offsetAt, type ZoneOffset } from '@/components/time'
import type { Trace, Trigger } from '@/shared/schemas'
import { formatDuration } from '@/shared/units'

export const TRIGGER_WORDS: Record<Trigger, string> = {
  leak: 'by itself',
  flush: 'after a flush',
  startup: 'drawing down',
  unknown: 'not told',
}
const MOST = 200

/** The same runs as figures, newest first. */
export function RunsTable({
  runs,
  offsets,
  nowMs,
}: {
  runs: Trace['runs']
  offsets: readonly ZoneOffset[]
  nowMs: number
}) {
  const newest = runs.slice(-MOST).reverse()
  return (
    <details className="mt-2">
      <summary>The runs as a table</summary>
      <table className="ruled mt-2 max-w-[40em]">
        <thead>
          <tr>
            <th scope="col">Started</th>
            <th scope="col">On for</th>
            <th scope="col">Why</th>
          </tr>
        </thead>
        <tbody>
          {newest.map((run) => (
            <tr key={run.startedAt}>
              <td className="figure">
                {dayAndClock(run.startedAt, offsetAt(offsets, run.startedAt), nowMs)}
              </td>
              <td className="figure">
                {run.stoppedAt === null ? 'still on' : formatDuration((run.stoppedAt - run.startedAt) / 1000)}
              </td>
              <td>{TRIGGER_WORDS[run.trigger]}</td>
            </tr>
          ))}
        </tbody>
      </table>
      {newest.length === 0 ? <p className="mt-2 text-ink-2">The pump did not run in this stretch.</p> : null}
      {runs.length > MOST ? (
        <p className="datum mt-2">
          The newest {MOST} of {runs.length}; come closer for the others.
        </p>
      ) : null}
    </details>
  )
}
