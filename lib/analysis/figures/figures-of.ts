import { standardPressurePa } from '../gas'
import { estimateHoldTime, type HoldTimeEstimate } from '../hold-time'
import { bandOf } from './band'
import { causeOf, signsOf } from './cause'
import { pumpDayOf } from './pump-day'
import { rankOf } from './rank'
import { sinceOfState } from './since'
import { reasonByHoldTime, stateBeforeHoldTime, stateByHoldTime, type StateFinding } from './state'
import type { Figures, FiguresInput, HoldTimeFigure, LeakRateFigure } from './types'

/**
 * All figures of one system as of `at`, from its rows, the head of its fold and what people said. Pure: the
 * same input gives the same answer. With no rows the state says what is missing and every figure is null.
 * @example figuresOf(figuresInput(state, { at, rows, settings, lastHeardAt: at }))
 */
export function figuresOf(input: FiguresInput): Figures {
  const { at, rows, open, learned, settings } = input
  const { cutOutPa, cutInPa, doubt } = bandOf(input)
  const hold = estimateHoldTime({
    at,
    runs: rows.runs,
    holds: rows.holds,
    legs: rows.legs,
    open,
    cutOutPa,
    settledPa: learned.settledPa,
    cutInPa,
    bandDoubt: doubt,
    standardPressurePa: standardPressurePa(settings.altitudeM),
    standingVacuum: settings.kind !== 'on-demand',
  })
  const finding = stateBeforeHoldTime(input) ?? findingByHoldTime(input, hold)
  const signs = signsOf(input, hold)
  return {
    at,
    ...finding,
    leakRate: leakRateOf(hold),
    holdTime: holdTimeOf(hold),
    method: hold?.method ?? 'none',
    cutOutPa,
    settledPa: learned.settledPa,
    cutInPa,
    recharge:
      signs.now.rechargePaPerSecond === null
        ? null
        : { paPerSecond: signs.now.rechargePaPerSecond, usualPaPerSecond: signs.usual.rechargePaPerSecond },
    cause: causeOf(finding.state, signs),
    signs,
    current: currentOf(input),
    pump: pumpDayOf(input),
    lastHeardAt: input.lastHeardAt,
    rank: rankOf(finding.state, hold?.seconds ?? null),
    model: hold?.model ?? null,
  }
}

function findingByHoldTime(input: FiguresInput, hold: HoldTimeEstimate | null): StateFinding {
  const state = stateByHoldTime(hold, input.settings)
  return { state, since: sinceOfState(input, state, hold), reason: reasonByHoldTime(input, hold) }
}

function leakRateOf(hold: HoldTimeEstimate | null): LeakRateFigure | null {
  if (hold === null || hold.rate === null) return null
  const { legs, hours, compensated } = hold
  return { ...hold.rate, legs, hours, compensated }
}

function holdTimeOf(hold: HoldTimeEstimate | null): HoldTimeFigure | null {
  if (hold === null) return null
  const { seconds, low, high, bound, holds } = hold
  return { seconds, low, high, bound, holds }
}

function currentOf({ at, current, open, lastHeardAt }: FiguresInput): Figures['current'] {
  if (current === null) return null
  const until = Math.min(at, lastHeardAt ?? at)
  const since = open.hold?.startedAt ?? null
  return {
    at: current.at,
    vacuumPa: current.vacuumPa,
    pumpOn: current.pumpOn,
    holdSoFarSeconds: since === null ? null : Math.max(0, (until - since) / 1000),
  }
}
