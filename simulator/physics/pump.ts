import { hashNormal } from '../random'
import { MS_PER_DAY, MS_PER_HOUR } from './constants'

export type PumpSpec = {
  /** Swept volume per second with no vacuum and nominal voltage, m³/s. */
  displacementM3PerS: number
  /** Vacuum at which it moves nothing more, Pa. */
  flatOutPa: number
  nominalV: number
  amps: number
  /** Lost share of displacement a day from an instant on, until it is rebuilt. */
  wear: readonly { from: number; perDay: number; until?: number }[]
}

export type SupplySpec = {
  /** Battery at rest, V, and half its daily swing with charging. */
  restV: number
  dailyV: number
  wanderV: number
  /** Drop at the pump while it runs, V. */
  sagV: number
  /** A battery that sinks: V a day from an instant until it is seen to. */
  sinking: readonly { from: number; perDayV: number; until?: number }[]
}

/** Displacement left by wear, 1 when new, never under a fifth. */
export function wearFactor(pump: PumpSpec, at: number): number {
  let lost = 0
  for (const wear of pump.wear) {
    if (at > wear.from && (wear.until === undefined || at < wear.until)) {
      lost += ((at - wear.from) / MS_PER_DAY) * wear.perDay
    }
  }
  return Math.max(0.2, 1 - lost)
}

/** Pumping speed at the pump's inlet, m³/s: falls in a straight line with vacuum, in proportion with voltage. */
export const pumpingSpeed = (pump: PumpSpec, vacuumPa: number, supplyV: number, wear: number): number =>
  Math.max(0, pump.displacementM3PerS * (1 - vacuumPa / pump.flatOutPa) * (supplyV / pump.nominalV) * wear)

/** Supply voltage at an instant, V. Highest in the early afternoon, when charging. */
export function supplyVoltage(
  supply: SupplySpec,
  seed: number,
  offsetSeconds: number,
  pumpOn: boolean,
  at: number,
) {
  const localMs = at + offsetSeconds * 1000
  let volts =
    supply.restV + supply.dailyV * Math.cos((2 * Math.PI * (localMs - 14 * MS_PER_HOUR)) / MS_PER_DAY)
  if (supply.wanderV > 0) volts += supply.wanderV * hashNormal(seed, 21, Math.floor(at / (6 * MS_PER_HOUR)))
  for (const sink of supply.sinking) {
    if (at > sink.from && (sink.until === undefined || at < sink.until)) {
      volts -= ((at - sink.from) / MS_PER_DAY) * sink.perDayV
    }
  }
  return Math.max(0, pumpOn ? volts - supply.sagV : volts)
}
