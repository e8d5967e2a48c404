import {
  CARRY_MS,
  DEFAULT_INTERVAL_SECONDS,
  GAP_AT_LEAST_MS,
  GAP_INTERVALS,
  LAG_RESTART_MS,
  PUMP_AWAITED_MS,
  PUMP_LOST_MS,
  SECOND,
} from './constants'
import type { Channels, FoldState } from './state'
import { LAG_SECONDS, type Instant, type Sample } from './types'

/** Silence after which a hold is broken, ms. */
export function gapLimitMs(state: FoldState): number {
  const interval = state.fitting?.intervalSeconds ?? DEFAULT_INTERVAL_SECONDS
  return Math.max(GAP_AT_LEAST_MS, GAP_INTERVALS * interval * SECOND)
}

/** Takes in air, barometer and supply, and lets the lagged copies of the air follow. */
export function takeWeather(channels: Channels, sample: Sample): void {
  if (sample.airC !== null) takeAir(channels, sample.at, sample.airC + 0)
  if (sample.barometerPa !== null) {
    channels.barometerPa = sample.barometerPa
    channels.barometerAt = sample.at
  }
  if (sample.supplyV !== null) {
    channels.supplyV = sample.supplyV + 0
    channels.supplyAt = sample.at
  }
}

function takeAir(channels: Channels, at: Instant, airC: number): void {
  const [lag0, lag1] = channels.laggedAirC
  const { airC: beforeC, airAt } = channels
  if (beforeC !== null && airAt !== null && lag0 !== null && lag1 !== null && at - airAt <= LAG_RESTART_MS) {
    const seconds = (at - airAt) / SECOND
    channels.laggedAirC[0] = follow(lag0, beforeC, airC, seconds, LAG_SECONDS[0]) + 0
    channels.laggedAirC[1] = follow(lag1, beforeC, airC, seconds, LAG_SECONDS[1]) + 0
  } else {
    channels.laggedAirC[0] = airC
    channels.laggedAirC[1] = airC
  }
  channels.airC = airC
  channels.airAt = at
}

/** First-order lag behind air that moved in a straight line over `seconds` (exact). */
function follow(lagC: number, fromC: number, toC: number, seconds: number, tau: number): number {
  const trailing = ((toC - fromC) * tau) / seconds
  return toC - trailing + (lagC - fromC + trailing) * Math.exp(-seconds / tau)
}

export const airIsFresh = (channels: Channels, at: Instant): boolean =>
  channels.airAt !== null && at - channels.airAt <= CARRY_MS
export const barometerIsFresh = (channels: Channels, at: Instant): boolean =>
  channels.barometerAt !== null && at - channels.barometerAt <= CARRY_MS

/** How the edges are told at this sample: by the pump channel, or by the vacuum's turning points. */
export function readsPump(state: FoldState, sample: Sample): boolean {
  if (sample.pumpOn !== null) return true
  const { pumpAt } = state.channels
  if (pumpAt !== null) return sample.at - pumpAt <= PUMP_LOST_MS
  const fitting = state.fitting
  return fitting !== null && fitting.pump && sample.at - fitting.at <= PUMP_AWAITED_MS
}

/**
 * How far an edge seen at this sample may be off, s: the spacing before it; at most 1 s for a record that the
 * logger sent at the edge itself, out of step with its rhythm.
 */
export function edgeUncertaintySeconds(state: FoldState, at: Instant): number {
  if (state.sampleAt === null) return 0
  const seconds = (at - state.sampleAt) / SECOND
  return isInRhythm(state, at) ? seconds : Math.min(1, seconds)
}

/** Whether a sample comes in the logger's rhythm: on its grid, or as long after the last as that one was. */
export function isInRhythm(state: FoldState, at: Instant): boolean {
  const { rhythmAt, sampleAt, fitting } = state
  if (rhythmAt === null || sampleAt === null || fitting === null) return true
  const spacing = at - sampleAt
  if (Math.abs(spacing - state.spacingMs) <= 0.02 * spacing) return true
  const interval = fitting.intervalSeconds * SECOND
  const beyond = (at - rhythmAt) % interval
  return Math.min(beyond, interval - beyond) <= 0.01 * interval + 100
}
