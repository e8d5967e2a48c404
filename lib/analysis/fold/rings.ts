import {
  DEFAULT_CUT_IN_PA,
  DEFAULT_CUT_OUT_PA,
  DEFAULT_SETTLING_PA,
  INHG,
  RING_ENOUGH,
  RING_LENGTH,
} from './constants'
import type { FoldState } from './state'

/** Adds a value to a ring, dropping the oldest beyond `length`. Values are rounded to 0.01. */
export function pushRing(ring: number[], value: number, length = RING_LENGTH): void {
  if (!Number.isFinite(value)) return
  ring.push(Math.round(value * 100) / 100 + 0)
  if (ring.length > length) ring.shift()
}

const scratch = new Float64Array(64)

/** Middle of a short list (at most 64); null for none. Asked several times a run, hence the sort by insertion. */
export function ringMedian(ring: readonly number[]): number | null {
  const size = Math.min(ring.length, scratch.length)
  for (let i = 0; i < size; i += 1) {
    const value = ring[i] ?? 0
    let place = i
    while (place > 0 && (scratch[place - 1] ?? 0) > value) {
      scratch[place] = scratch[place - 1] ?? 0
      place -= 1
    }
    scratch[place] = value
  }
  if (size === 0) return null
  const middle = scratch[size >> 1] ?? 0
  return size % 2 === 1 ? middle : (middle + (scratch[(size >> 1) - 1] ?? middle)) / 2
}

/** A ring's median once it has five values, else the set-up's figure, else what there is, else the default. */
function learnedOr(ring: readonly number[], setPa: number | null, defaultPa: number): number {
  if (ring.length >= RING_ENOUGH) return ringMedian(ring) ?? defaultPa
  return setPa ?? ringMedian(ring) ?? defaultPa
}

export function learnedCutInPa(state: FoldState): number {
  const { cutInPa, sparseStartPa } = state.rings
  if (cutInPa.length >= RING_ENOUGH || state.settings.cutInPa !== null) {
    return learnedOr(cutInPa, state.settings.cutInPa, DEFAULT_CUT_IN_PA)
  }
  return ringMedian(cutInPa) ?? lowestCluster(sparseStartPa) ?? DEFAULT_CUT_IN_PA
}
/**
 * Samples far apart hide falls, so that starts lie at the switch's level or anywhere above it: the lowest
 * levels that agree within 0.2 inHg are the switch's. Null until four do.
 */
function lowestCluster(levels: readonly number[]): number | null {
  const sorted = [...levels].sort((a, b) => a - b)
  const size = Math.max(4, Math.ceil(sorted.length / 5))
  const from = sorted.findIndex((low, i) => (sorted[i + size - 1] ?? Infinity) - low <= 0.2 * INHG)
  return from < 0 ? null : ringMedian(sorted.slice(from, from + size))
}
export const learnedCutOutPa = (state: FoldState): number =>
  learnedOr(state.rings.cutOutPa, state.settings.cutOutPa, DEFAULT_CUT_OUT_PA)
export const learnedSettledPa = (state: FoldState): number =>
  learnedOr(state.rings.settledPa, null, learnedCutOutPa(state) - DEFAULT_SETTLING_PA)

/** Whether any figure for the cut-in exists, learned or set. */
export const cutInIsKnown = (state: FoldState): boolean =>
  state.rings.cutInPa.length > 0 ||
  state.settings.cutInPa !== null ||
  lowestCluster(state.rings.sparseStartPa) !== null

export interface Learned {
  cutOutPa: number
  settledPa: number
  cutInPa: number
  /** Usual recharge over the band between cut-in and cut-out; null until seen. */
  rechargePaPerSecond: number | null
  /** Usual length of a leak run (of any run where there is no vacuum channel). */
  runSeconds: number | null
  /** How many readings stand behind each; under five the set-up's figure serves. */
  counts: { cutOut: number; settled: number; cutIn: number; recharge: number; run: number }
}

/** What the system has taught: medians of the last 21 readings of each kind. */
export function learned(state: FoldState): Learned {
  const { rings } = state
  return {
    cutOutPa: learnedCutOutPa(state),
    settledPa: learnedSettledPa(state),
    cutInPa: learnedCutInPa(state),
    rechargePaPerSecond: ringMedian(rings.rechargePaPerSecond),
    runSeconds: ringMedian(rings.runSeconds),
    counts: {
      cutOut: rings.cutOutPa.length,
      settled: rings.settledPa.length,
      cutIn: rings.cutInPa.length,
      recharge: rings.rechargePaPerSecond.length,
      run: rings.runSeconds.length,
    },
  }
}
