import { formatDuration, formatVacuum } from '@/shared/units'
import type { HoldTimeEstimate } from '../hold-time'
import type { FiguresInput, SystemState } from './types'

/** Under this hold time a system short-cycles. */
export const SHORT_CYCLING_SECONDS = 600
export interface StateFinding {
  state: SystemState
  since: number | null
  reason: string
}

/** What people said or the newest readings show, in the order that rules; null = the hold time decides. */
export function stateBeforeHoldTime(input: FiguresInput): StateFinding | null {
  return unheard(input) ?? said(input) ?? runningOn(input) ?? off(input)
}

function unheard({ at, lastHeardAt, settings }: FiguresInput): StateFinding | null {
  if (lastHeardAt === null) return { state: 'unheard', since: null, reason: 'nothing heard yet' }
  const silentSeconds = (at - lastHeardAt) / 1000
  if (silentSeconds <= settings.silenceSeconds) return null
  return {
    state: 'unheard',
    since: lastHeardAt,
    reason: `nothing heard for ${formatDuration(silentSeconds)}`,
  }
}

function said({ statement }: FiguresInput): StateFinding | null {
  if (statement === null || statement.value === 'off') return null
  const words = statement.value === 'laid-up' ? 'said to be laid up' : 'being worked on'
  return { state: statement.value, since: statement.since, reason: words }
}

function runningOn({ open, condition, at, lastHeardAt }: FiguresInput): StateFinding | null {
  if (condition.runningOnSince === null || open.run === null) return null
  const seconds = (Math.min(at, lastHeardAt ?? at) - open.run.startedAt) / 1000
  return {
    state: 'running-on',
    since: open.run.startedAt,
    reason: `the pump has been on for ${formatDuration(seconds)} and the vacuum does not rise`,
  }
}

function off({ statement, condition, current }: FiguresInput): StateFinding | null {
  if (statement?.value === 'off') {
    return { state: 'off', since: statement.since, reason: 'said to be switched off' }
  }
  if (condition.offSince === null) return null
  const vacuum = formatVacuum(current?.vacuumPa, 'inHg')
  return { state: 'off', since: condition.offSince, reason: `at ${vacuum}, and the pump does not start` }
}

/** The state by hold time alone; a bound that does not reach the limit says nothing. */
export function stateByHoldTime(
  hold: Pick<HoldTimeEstimate, 'seconds' | 'bound'> | null,
  settings: { limitSeconds: number; aimSeconds: number },
): SystemState {
  if (hold === null) return 'learning'
  if (hold.seconds >= settings.aimSeconds) return 'tight'
  if (hold.bound === 'at-least' && hold.seconds < settings.limitSeconds) return 'learning'
  if (hold.seconds >= settings.limitSeconds) return 'weeping'
  return hold.seconds >= SHORT_CYCLING_SECONDS ? 'leaking' : 'short-cycling'
}

/** The sentence beside a state by hold time. */
export function reasonByHoldTime(input: FiguresInput, hold: HoldTimeEstimate | null): string {
  if (input.settings.kind === 'on-demand') return 'no standing vacuum: hold time does not apply'
  if (hold === null) return 'too few quiet hours heard yet'
  const length = `${hold.bound === null ? 'holds' : 'holds at least'} ${formatDuration(hold.seconds)}`
  const { limitSeconds, aimSeconds } = input.settings
  if (hold.seconds >= aimSeconds) return `${length}, over the aim of ${formatDuration(aimSeconds)}`
  if (hold.seconds >= limitSeconds) return `${length}, over the limit of ${formatDuration(limitSeconds)}`
  return `${length}, under the limit of ${formatDuration(limitSeconds)}`
}
