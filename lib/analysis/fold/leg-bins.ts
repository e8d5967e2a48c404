import { airIsFresh, barometerIsFresh } from './channels'
import { FIRST_BIN_SECONDS, MAX_BINS, SECOND } from './constants'
import type { Channels, OpenBin, OpenLeg } from './state'
import type { Instant, LegBins } from './types'

/** A leg that begins at its first sample; the grid of its bins starts there. */
export function openLeg(at: Instant, sinceFlushSeconds: number | null, setAside: boolean): OpenLeg {
  return {
    startedAt: at,
    endedAt: at,
    sinceFlushSeconds,
    setAside,
    widthSeconds: FIRST_BIN_SECONDS,
    offsetSeconds: [],
    count: [],
    vacuumPa: [],
    airC: [],
    lag0C: [],
    lag1C: [],
    barometerPa: [],
    open: null,
  }
}

/** Adds a sample's vacuum with the weather in force. Cost is constant but for a doubling now and then. */
export function addToLeg(leg: OpenLeg, at: Instant, vacuumPa: number, channels: Channels): void {
  const offset = (at - leg.startedAt) / SECOND
  while (offset >= MAX_BINS * leg.widthSeconds) doubleWidth(leg)
  const index = Math.floor(offset / leg.widthSeconds)
  if (leg.open !== null && leg.open.index !== index) closeBin(leg, leg.open)
  const bin = leg.open ?? (leg.open = emptyBin(index))
  bin.count += 1
  bin.offsetSum += offset
  bin.vacuumSum += vacuumPa
  const [lag0, lag1] = channels.laggedAirC
  if (channels.airC !== null && lag0 !== null && lag1 !== null && airIsFresh(channels, at)) {
    bin.airCount += 1
    bin.airSum += channels.airC
    bin.lag0Sum += lag0
    bin.lag1Sum += lag1
  }
  if (channels.barometerPa !== null && barometerIsFresh(channels, at)) {
    bin.barometerCount += 1
    bin.barometerSum += channels.barometerPa
  }
  leg.endedAt = at
}

const emptyBin = (index: number): OpenBin => ({
  index,
  count: 0,
  offsetSum: 0,
  vacuumSum: 0,
  airCount: 0,
  airSum: 0,
  lag0Sum: 0,
  lag1Sum: 0,
  barometerCount: 0,
  barometerSum: 0,
})

// Offsets are rounded down so that a mean never leaves its bin.
const roundOffset = (seconds: number): number => Math.floor(seconds * 10) / 10
// Adding nought turns a minus nought, which text does not know, into a plain one.
const roundPa = (pa: number): number => Math.round(pa * 100) / 100 + 0
const roundC = (celsius: number): number => Math.round(celsius * 1000) / 1000 + 0
const meanOrNull = (sum: number, count: number): number | null => (count === 0 ? null : roundC(sum / count))

/** Moves the bin in the making to the closed ones, rounded. */
function closeBin(leg: OpenLeg, bin: OpenBin): void {
  appendClosed(leg, bin)
  leg.open = null
}

function appendClosed(leg: OpenLeg, bin: OpenBin): void {
  leg.offsetSeconds.push(roundOffset(bin.offsetSum / bin.count))
  leg.count.push(bin.count)
  leg.vacuumPa.push(roundPa(bin.vacuumSum / bin.count))
  leg.airC.push(meanOrNull(bin.airSum, bin.airCount))
  leg.lag0C.push(meanOrNull(bin.lag0Sum, bin.airCount))
  leg.lag1C.push(meanOrNull(bin.lag1Sum, bin.airCount))
  leg.barometerPa.push(
    bin.barometerCount === 0 ? null : Math.round((bin.barometerSum / bin.barometerCount) * 10) / 10,
  )
}

/** Twice as wide bins: pairs on the leg's own grid become one, weighted by their counts. */
function doubleWidth(leg: OpenLeg): void {
  if (leg.open !== null) closeBin(leg, leg.open)
  const width = leg.widthSeconds * 2
  const index = leg.offsetSeconds.map((offset) => Math.floor(offset / width))
  const { count } = leg
  const weights = count.slice()
  leg.offsetSeconds = merged(leg.offsetSeconds, weights, index, roundOffset)
  leg.vacuumPa = merged(leg.vacuumPa, weights, index, roundPa)
  leg.airC = mergedOrNull(leg.airC, weights, index)
  leg.lag0C = mergedOrNull(leg.lag0C, weights, index)
  leg.lag1C = mergedOrNull(leg.lag1C, weights, index)
  leg.barometerPa = mergedOrNull(leg.barometerPa, weights, index)
  leg.count = mergedCounts(weights, index)
  leg.widthSeconds = width
}

function merged(
  values: readonly number[],
  weights: readonly number[],
  index: readonly number[],
  round: (value: number) => number,
): number[] {
  const out: number[] = []
  let weight = 0
  values.forEach((value, i) => {
    const own = weights[i] ?? 1
    const before = out[out.length - 1]
    if (i > 0 && index[i] === index[i - 1] && before !== undefined) {
      out[out.length - 1] = round((before * weight + value * own) / (weight + own))
      weight += own
    } else {
      out.push(value)
      weight = own
    }
  })
  return out
}

function mergedOrNull(
  values: readonly (number | null)[],
  weights: readonly number[],
  index: readonly number[],
): (number | null)[] {
  const out: (number | null)[] = []
  let weight = 0
  values.forEach((value, i) => {
    const own = value === null ? 0 : (weights[i] ?? 1)
    if (i > 0 && index[i] === index[i - 1]) {
      const before = out[out.length - 1] ?? null
      if (before === null) out[out.length - 1] = value
      else if (value !== null) out[out.length - 1] = roundC((before * weight + value * own) / (weight + own))
      weight += own
    } else {
      out.push(value)
      weight = own
    }
  })
  return out
}

function mergedCounts(counts: readonly number[], index: readonly number[]): number[] {
  const out: number[] = []
  counts.forEach((value, i) => {
    if (i > 0 && index[i] === index[i - 1]) out[out.length - 1] = (out[out.length - 1] ?? 0) + value
    else out.push(value)
  })
  return out
}

/** How many bins a leg has, the one in the making included. */
export const binCount = (leg: OpenLeg): number => leg.count.length + (leg.open === null ? 0 : 1)

/** The leg's bins as a row carries them, the one in the making included. The leg is not changed. */
export function binsOf(leg: OpenLeg): LegBins {
  const copy: OpenLeg = {
    ...leg,
    offsetSeconds: leg.offsetSeconds.slice(),
    count: leg.count.slice(),
    vacuumPa: leg.vacuumPa.slice(),
    airC: leg.airC.slice(),
    lag0C: leg.lag0C.slice(),
    lag1C: leg.lag1C.slice(),
    barometerPa: leg.barometerPa.slice(),
  }
  if (leg.open !== null) appendClosed(copy, leg.open)
  return {
    widthSeconds: copy.widthSeconds,
    offsetSeconds: copy.offsetSeconds,
    count: copy.count,
    vacuumPa: copy.vacuumPa,
    airC: copy.airC,
    laggedAirC: [copy.lag0C, copy.lag1C],
    barometerPa: copy.barometerPa,
  }
}
