import type { LegBins } from '../fold/types'
import { celsiusToKelvin } from '@/shared/units'
import { mergeBins, type LegPoint } from '../legs'
import { laminarDrivePa, orificeDrivePa } from './leak-law'
import { at, type Symmetric } from './symmetric'

/**
 * Unknowns of the fit: orifice and laminar rate at mid-band (Pa/h), gas response to air and its two lags (Pa/K),
 * and what the gas still gives back while it warms after a stop (Pa at the stop, falling off in a minute).
 */
export const UNKNOWNS = 6
const SETTLING_SECONDS = 60

/** What the fit needs of a leg: its bins, when it began, and where its hold began. */
export interface FitLeg {
  holdStartedAt: number
  startedAt: number
  endedAt: number
  bins: LegBins
}

export interface LegEquations {
  startedAt: number
  endedAt: number
  hours: number
  /** Centred regressors, one row of `UNKNOWNS` a bin, and the centred absolute pressure. */
  design: Float64Array
  pressure: Float64Array
  count: number
  /** Aᵀ·A, Aᵀ·y and yᵀ·y of the centred rows, and Σ(t − t̄)² in h². */
  normal: Symmetric
  right: Float64Array
  total: number
  timeSquares: number
  /** Centred times, h. */
  hoursOf: Float64Array
  hasAir: boolean
  hasBarometer: boolean
}

export interface BandFrame {
  midPa: number
  standardPressurePa: number
}

const MAX_ROWS = 30
const REFERENCE_K = 293.15

/**
 * One leg's part of the fit: absolute pressure regressed, with an intercept of its own, on the integrals of
 * both leak laws at the pressures that were, and on the gas temperature that drives it. Missing channels leave
 * their columns at nought. The first minutes of a long leg that opens its hold are left out, since the gas
 * still warms back; what is left of that has a column of its own. Null with fewer than 3 usable bins.
 */
export function legEquations(leg: FitLeg, frame: BandFrame): LegEquations | null {
  const points = mergedPoints(leg)
  const sinceStopSeconds = (leg.startedAt - leg.holdStartedAt) / 1000
  const count = points.length
  if (count < 3) return null
  const hasAir = points.every((point) => Number.isFinite(point.airC + point.laggedC + point.slowC))
  const hasBarometer = points.every((point) => Number.isFinite(point.barometerPa))
  const middlePa = frame.standardPressurePa - frame.midPa
  const orificeMid = orificeDrivePa(frame.standardPressurePa, middlePa)
  const laminarMid = laminarDrivePa(frame.standardPressurePa, middlePa, frame.standardPressurePa)

  const design = new Float64Array(count * UNKNOWNS)
  const pressure = new Float64Array(count)
  const hoursOf = new Float64Array(count)
  let orifice = 0
  let laminar = 0
  let before = { hours: 0, orifice: 0, laminar: 0 }
  points.forEach((point, row) => {
    const ambientPa = hasBarometer ? point.barometerPa : frame.standardPressurePa
    const insidePa = ambientPa - point.vacuumPa
    const warmth = hasAir ? Math.sqrt(celsiusToKelvin(point.airC) / REFERENCE_K) : 1
    const here = {
      hours: point.offsetSeconds / 3600,
      orifice: (orificeDrivePa(ambientPa, insidePa) / orificeMid) * warmth,
      laminar: laminarDrivePa(ambientPa, insidePa, frame.standardPressurePa) / laminarMid,
    }
    if (row > 0) {
      const half = (here.hours - before.hours) / 2
      orifice += half * (here.orifice + before.orifice)
      laminar += half * (here.laminar + before.laminar)
    }
    before = here
    hoursOf[row] = here.hours
    pressure[row] = insidePa
    const gas = hasAir ? [point.airC, point.laggedC, point.slowC] : [0, 0, 0]
    const warming = -Math.exp(-(sinceStopSeconds + point.offsetSeconds) / SETTLING_SECONDS)
    design.set([orifice, laminar, ...gas, warming], row * UNKNOWNS)
  })
  const hours = at(hoursOf, count - 1) - at(hoursOf, 0)
  centreColumns(design, count, UNKNOWNS)
  centreColumns(pressure, count, 1)
  centreColumns(hoursOf, count, 1)
  const span = { startedAt: leg.startedAt, endedAt: leg.endedAt, hours }
  return { ...squares(design, pressure, hoursOf, count), ...span, hasAir, hasBarometer }
}

/** The leg's points after the settling, neighbours averaged so that it has at most `MAX_ROWS`. */
function mergedPoints({ bins, startedAt, holdStartedAt }: FitLeg): LegPoint[] {
  const lengthSeconds = (bins.offsetSeconds.at(-1) ?? 0) - (bins.offsetSeconds[0] ?? 0)
  const sinceHoldSeconds = (startedAt - holdStartedAt) / 1000
  const settlingSeconds = Math.min(300, 0.08 * lengthSeconds) - Math.max(0, sinceHoldSeconds - 60)
  return mergeBins(bins, MAX_ROWS, settlingSeconds)
}

function centreColumns(values: Float64Array, count: number, width: number): void {
  for (let column = 0; column < width; column += 1) {
    let sum = 0
    for (let row = 0; row < count; row += 1) sum += at(values, row * width + column)
    const mean = sum / count
    for (let row = 0; row < count; row += 1) {
      values[row * width + column] = at(values, row * width + column) - mean
    }
  }
}

function squares(design: Float64Array, pressure: Float64Array, hoursOf: Float64Array, count: number) {
  const normal = new Float64Array(UNKNOWNS * UNKNOWNS)
  const right = new Float64Array(UNKNOWNS)
  let total = 0
  let timeSquares = 0
  for (let row = 0; row < count; row += 1) {
    const y = at(pressure, row)
    total += y * y
    timeSquares += at(hoursOf, row) ** 2
    for (let j = 0; j < UNKNOWNS; j += 1) {
      const x = at(design, row * UNKNOWNS + j)
      right[j] = at(right, j) + x * y
      for (let k = 0; k <= j; k += 1) {
        normal[j * UNKNOWNS + k] = at(normal, j * UNKNOWNS + k) + x * at(design, row * UNKNOWNS + k)
      }
    }
  }
  for (let j = 0; j < UNKNOWNS; j += 1) {
    for (let k = 0; k < j; k += 1) normal[k * UNKNOWNS + j] = at(normal, j * UNKNOWNS + k)
  }
  return { design, pressure, hoursOf, count, normal, right, total, timeSquares }
}
