'use client'

import { useEffect } from 'react'
import { send } from '@/components/data/request'
import { CheckResult } from '@/components/register/check-result'
import { CHECK_WORDS } from '@/components/register/check-words'
import type { GaugeResolutions } from '@/components/register/gauge'
import { LeakDownFields } from '@/components/register/leak-down-fields'
import { LeaveOut } from '@/components/register/leave-out'
import { LiveLine } from '@/components/register/live-line'
import { lastDone, underWay } from '@/components/register/steps'
import { TwoPointFields } from '@/components/register/two-point-fields'
import { useWork, type Acts } from '@/components/register/use-commissioning'
import { Button } from '@/components/ui/button'
import { Caution, Trouble } from '@/components/ui/sheet-states'
import type { CheckKind, Commissioning, StepCheck } from '@/shared/schemas'

const WATCH_MINUTES = 30
const WATCH_AGAIN_MS = 20 * 60_000

/** Asks the logger for a reading every two seconds for as long as somebody stands on the step. */
function useWatch(loggerId: string | undefined): void {
  useEffect(() => {
    if (loggerId === undefined) return
    // Without it the check only takes longer, so a refusal is no trouble.
    const ask = () =>
      void send('POST', `/api/loggers/${loggerId}/watch`, {
        intervalSeconds: 2,
        minutes: WATCH_MINUTES,
      }).catch(() => undefined)
    ask()
    const timer = setInterval(ask, WATCH_AGAIN_MS)
    return () => clearInterval(timer)
  }, [loggerId])
}

type Props = {
  commissioning: Commissioning
  kind: CheckKind
  acts: Acts
  resolutions: GaugeResolutions
  onward: () => void
}

/** One check: why, how, what may hurt, the readings as they come, the verdict, and what to try. */
export function CheckStep({ commissioning, kind, acts, resolutions, onward }: Props) {
  const words = CHECK_WORDS[kind]
  const { busy, trouble, attempt } = useWork()
  const current = underWay(commissioning, kind)
  const last = lastDone(commissioning, kind)
  const byHand = kind === 'leak-down-before'
  useWatch(byHand ? undefined : commissioning.logger?.id)
  const step = (given: StepCheck) => void attempt(() => acts.step(kind, given))
  const begin = () => step({ step: 'begin' })
  if (commissioning.logger === null && !byHand)
    return <p>The logger comes first: grant it its key under “Logger and key”.</p>
  return (
    <div className="grid gap-5">
      <p className="max-w-[44em] text-ink-2">{words.why}</p>
      {words.caution ? <Caution>{words.caution}</Caution> : null}
      <ol className="grid max-w-[44em] list-decimal gap-1.5 pl-5">
        {words.how.map((line) => (
          <li key={line}>{line}</li>
        ))}
      </ol>
      {byHand ? null : <LiveLine id={commissioning.id} />}
      <div aria-live="polite" className="grid gap-5">
        {current ? null : last ? <CheckResult check={last} /> : null}
        {current && current.reason !== '' ? <CheckResult check={current} /> : null}
      </div>
      {trouble ? <Trouble title={trouble} /> : null}
      {current ? (
        <div className="grid gap-4">
          {kind === 'two-point' ? (
            <TwoPointFields busy={busy} word={words.done} resolutions={resolutions} send={step} />
          ) : kind === 'leak-down-before' ? (
            <LeakDownFields
              busy={busy}
              word={words.done}
              beganAt={current.beganAt}
              resolutions={resolutions}
              send={step}
            />
          ) : (
            <div>
              <Button disabled={busy} onClick={() => step({ step: 'done' })}>
                {busy ? 'Checking …' : words.done}
              </Button>
            </div>
          )}
          <div>
            <Button weight="plain" disabled={busy} onClick={begin}>
              Begin it again
            </Button>
          </div>
        </div>
      ) : last?.outcome === 'passed' || last?.outcome === 'left-out' ? (
        <div className="flex flex-wrap gap-3">
          <Button onClick={onward}>Go on</Button>
          <Button weight="quiet" disabled={busy} onClick={begin}>
            Do it again
          </Button>
        </div>
      ) : (
        <div>
          <Button disabled={busy} onClick={begin}>
            {last ? 'Try again' : words.begin}
          </Button>
        </div>
      )}
      {last?.outcome === 'passed' ? null : (
        <LeaveOut busy={busy} leave={(reason) => step({ step: 'leave-out', reason })} />
      )}
    </div>
  )
}
