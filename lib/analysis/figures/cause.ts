import type { HoldRow } from '../fold/types'
import type { HoldTimeEstimate } from '../hold-time'
import { median } from '../statistics'
import type { Cause, Figures, FiguresInput, LeakSigns, SystemState } from './types'

const DAY_MS = 86_400_000
const FEWEST = 3

/**
 * Rate, recharge, differential and K = r/(R + r) over the last day and, for the usual, over the days before.
 * Rates come from holds that the leak ended, like with like; where those are few the fitted rate stands for now.
 */
export function signsOf(input: FiguresInput, hold: HoldTimeEstimate | null): Figures['signs'] {
  const split = input.at - DAY_MS
  const isNow = (endedAt: number) => endedAt > split
  const now = signsFrom(input, (endedAt) => isNow(endedAt))
  const usual = signsFrom(input, (endedAt) => !isNow(endedAt))
  const rate = now.ratePaPerSecond ?? (hold?.rate ? hold.rate.paPerHour / 3600 : null)
  return { now: withRatio({ ...now, ratePaPerSecond: rate }), usual: withRatio(usual) }
}

function signsFrom({ rows }: FiguresInput, wanted: (endedAt: number) => boolean): LeakSigns {
  const holds = newest(rows.holds).filter((hold) => !hold.setAside && wanted(hold.endedAt))
  const rates = holds.flatMap((hold) => rateOfHold(hold) ?? [])
  const recharges = newest(rows.runs)
    .filter((run) => !run.interrupted && run.trigger !== 'startup' && wanted(run.stoppedAt))
    .flatMap((run) => run.rechargePaPerSecond ?? [])
  // Measured points, not the learned medians: a switch that drifts is seen as soon as three holds show it.
  const differentials = holds.flatMap((hold) =>
    hold.ending === 'leak' && hold.cutOutPa !== null && hold.endPa !== null
      ? [hold.cutOutPa - hold.endPa]
      : [],
  )
  const middle = (values: number[]) => (values.length < FEWEST ? null : median(values))
  return {
    ratePaPerSecond: middle(rates),
    rechargePaPerSecond: middle(recharges),
    differentialPa: middle(differentials),
    ratio: null,
  }
}

/** As many of the newest rows as a median needs: a short-cycling pump makes hundreds a day. */
const MOST_ROWS = 1_200
function newest<Row extends { startedAt: number }>(rows: readonly Row[]): readonly Row[] {
  if (rows.length <= MOST_ROWS) return rows
  return [...rows].sort((a, b) => b.startedAt - a.startedAt).slice(0, MOST_ROWS)
}

function rateOfHold(hold: HoldRow): number | null {
  if (hold.ending !== 'leak' || hold.flushes > 0) return null
  const fromPa = hold.settledPa ?? hold.cutOutPa
  const seconds = (hold.endedAt - hold.startedAt) / 1000
  if (fromPa === null || hold.endPa === null || seconds <= 0) return null
  return (fromPa - hold.endPa) / seconds
}

function withRatio(signs: LeakSigns): LeakSigns {
  const { ratePaPerSecond: rate, rechargePaPerSecond: recharge } = signs
  return rate === null || recharge === null || !(recharge + rate > 0)
    ? signs
    : { ...signs, ratio: rate / (recharge + rate) }
}

/** Changes under these factors are weather and chance (judged). */
const RATE_CHANGED = 1.3
const RECHARGE_CHANGED = 1.2
const DIFFERENTIAL_SHRANK = 0.75

/**
 * Which of leak, pump, switch and gas space shortens the holds: D down with r the same, the switch; r and R up
 * together with K the same, the gas space; R down with r the same, the pump; r up, the leak (with R down, a
 * suction check valve, which is a leak as well). Without a usual to compare with, a system that holds too short
 * leaks; a sound one has no cause: null.
 */
export function causeOf(state: SystemState, { now, usual }: Figures['signs']): Cause | null {
  const factor = (a: number | null, b: number | null): number | null =>
    a === null || b === null || !(b > 0) ? null : a / b
  const rate = factor(now.ratePaPerSecond, usual.ratePaPerSecond)
  const recharge = factor(now.rechargePaPerSecond, usual.rechargePaPerSecond)
  const differential = factor(now.differentialPa, usual.differentialPa)
  const ratio = factor(now.ratio, usual.ratio)
  const rateUp = rate !== null && rate > RATE_CHANGED
  if (differential !== null && differential < DIFFERENTIAL_SHRANK && !rateUp) return 'switch'
  const rechargeUp = recharge !== null && recharge > RECHARGE_CHANGED
  if (rateUp && rechargeUp && ratio !== null && Math.abs(Math.log(ratio)) < 0.2) return 'gas-space'
  if (recharge !== null && recharge < 1 / RECHARGE_CHANGED && !rateUp) return 'pump'
  if (rateUp) return 'leak'
  return state === 'leaking' || state === 'short-cycling' || state === 'weeping' ? 'leak' : null
}
