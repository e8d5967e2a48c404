import { PA_PER_INHG, formatDuration, formatVacuum } from '@/shared/units'
import type { HoldTimeEstimate } from '../hold-time'
import { median } from '../statistics'
import type { FiguresInput, SystemState } from './types'

/** Under this hold time a system short-cycles. */
export const SHORT_CYCLING_SECONDS = 600
const RUNNING_ON_LEAST_SECONDS = 300
/** A rise under this in two minutes is none (twice a logger's step). */
const NO_RISE_PA = 70
const OFF_UNDER_CUT_IN_PA = PA_PER_INHG
const OFF_AFTER_SECONDS = 600

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

/** The last instant anything is known of. */
const knownUntil = ({ at, lastHeardAt }: FiguresInput): number => Math.min(at, lastHeardAt ?? at)

function runningOn(input: FiguresInput): StateFinding | null {
  const { run } = input.open
  if (run === null || run.interrupted) return null
  const seconds = (knownUntil(input) - run.startedAt) / 1000
  const needed = neededSeconds(input)
  const limit = Math.max(RUNNING_ON_LEAST_SECONDS, 2 * (needed ?? RUNNING_ON_LEAST_SECONDS))
  if (seconds < limit || (input.risePa !== null && input.risePa > NO_RISE_PA)) return null
  const usual = needed === null ? '' : `, ${formatDuration(needed)} would do`
  return { state: 'running-on', since: run.startedAt, reason: `on for ${formatDuration(seconds)}${usual}` }
}

/** What the learned recharge needs from the vacuum at the run's start; by usual run lengths without vacuum. */
function neededSeconds({ open, learned, rows }: FiguresInput): number | null {
  const fromPa = open.run?.vacuumAtStartPa ?? null
  if (fromPa !== null && learned.cutOutPa !== null && learned.rechargePaPerSecond !== null) {
    return Math.max(0, learned.cutOutPa - fromPa) / learned.rechargePaPerSecond
  }
  const ended = rows.runs.filter((run) => !run.interrupted && run.trigger !== 'startup')
  return median(ended.map((run) => (run.stoppedAt - run.startedAt) / 1000))
}

/** Said to be off, or vacuum an inch under the cut-in for ten minutes and no start. */
function off(input: FiguresInput): StateFinding | null {
  if (input.statement?.value === 'off') {
    return { state: 'off', since: input.statement.since, reason: 'said to be switched off' }
  }
  const { current, learned, open, rows } = input
  if (open.run !== null || open.hold !== null || current?.pumpOn === true) return null
  const vacuumPa = current?.vacuumPa ?? null
  if (vacuumPa === null || learned.cutInPa === null) return null
  if (vacuumPa > learned.cutInPa - OFF_UNDER_CUT_IN_PA) return null
  const ends = [...rows.holds.map((hold) => hold.endedAt), ...rows.runs.map((run) => run.stoppedAt)]
  const since = ends.length === 0 ? null : Math.max(...ends)
  if (since !== null && knownUntil(input) - since < OFF_AFTER_SECONDS * 1000) return null
  return {
    state: 'off',
    since,
    reason: `${formatVacuum(vacuumPa, 'inHg')}, under the cut-in, and the pump does not start`,
  }
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
