'use client'

import { CheckResult } from '@/components/register/check-result'
import { STEP_WORDS } from '@/components/register/steps'
import { dayAndClock } from '@/components/time'
import type { Commissioning } from '@/shared/schemas'

/** The commissioning as one sentence: passed, with exceptions, or not yet. */
export function recordFinding(commissioning: Commissioning): string {
  const { needed, checks, finishedAt, passed } = commissioning
  const lastOf = (kind: (typeof needed)[number]) =>
    checks.findLast((check) => check.kind === kind && check.doneAt !== null)?.outcome
  const named = (wanted: string) =>
    needed.filter((kind) => lastOf(kind) === wanted).map((kind) => STEP_WORDS[kind].toLowerCase())
  const open = needed
    .filter((kind) => lastOf(kind) === undefined)
    .map((kind) => STEP_WORDS[kind].toLowerCase())
  const left = named('left-out')
  const failed = named('failed')
  const parts = [
    failed.length > 0 ? `did not pass: ${failed.join(', ')}` : '',
    open.length > 0 ? `not done: ${open.join(', ')}` : '',
    left.length > 0 ? `left out: ${left.join(', ')}` : '',
  ].filter((part) => part !== '')
  const head =
    finishedAt === null
      ? parts.length === 0
        ? 'Every check has passed; it can be signed off.'
        : 'Not signed off yet.'
      : passed
        ? 'Signed off: the logger and its fitting are proven.'
        : 'Signed off with exceptions.'
  if (parts.length === 0) return head
  const rest = parts.join('; ')
  return `${head} ${rest.charAt(0).toUpperCase()}${rest.slice(1)}.`
}

/** Every attempt with its figures, who did it and when. */
export function RecordView({ commissioning, nowMs }: { commissioning: Commissioning; nowMs: number }) {
  const offset = commissioning.system?.utcOffsetSeconds ?? 0
  const at = (instant: string | null) => (instant === null ? '' : dayAndClock(instant, offset, nowMs))
  const done = commissioning.checks.filter((check) => check.doneAt !== null)
  return (
    <div>
      <p className="max-w-[40em] text-finding tracking-[-0.015em]">{recordFinding(commissioning)}</p>
      <table className="ruled mt-5 max-w-[44em]">
        <tbody>
          <Line name="Logger" value={commissioning.serial} />
          <Line
            name="Fitted to"
            value={
              commissioning.system
                ? [commissioning.system.vesselName, commissioning.system.name].filter(Boolean).join(', ')
                : 'no boat yet'
            }
          />
          <Line name="Measures" value={commissioning.logger?.channels.join(', ') ?? ''} />
          <Line name="Begun" value={`${at(commissioning.startedAt)} by ${commissioning.startedBy}`} />
          {commissioning.fittedAt ? <Line name="Registered" value={at(commissioning.fittedAt)} /> : null}
          {commissioning.finishedAt ? (
            <Line
              name="Signed off"
              value={`${at(commissioning.finishedAt)} by ${commissioning.finishedBy ?? ''}`}
            />
          ) : null}
          {commissioning.note ? <Line name="Note" value={commissioning.note} /> : null}
        </tbody>
      </table>
      <h2 className="mt-8">Checks, in the order they were done</h2>
      <ol>
        {done.map((check, index) => (
          <li key={index} className="break-inside-avoid border-b border-line py-4">
            <h3>
              {STEP_WORDS[check.kind]}
              <span className="datum ml-3 font-normal">
                {at(check.doneAt)}
                {check.doneBy ? `, ${check.doneBy}` : ''}
              </span>
            </h3>
            <div className="mt-1">
              <CheckResult check={check} />
            </div>
          </li>
        ))}
      </ol>
      {done.length === 0 ? <p className="py-4 text-ink-2">No check has been done yet.</p> : null}
    </div>
  )
}

const Line = ({ name, value }: { name: string; value: string }) => (
  <tr>
    <th scope="row" className="w-[30%]">
      {name}
    </th>
    <td>{value}</td>
  </tr>
)
