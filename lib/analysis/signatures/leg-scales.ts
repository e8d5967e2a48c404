import type { LegRow } from '../fold/types'
import { ratePaPerHourAt } from '../fit'

export interface LegScale {
  leg: LegRow
  /** Logarithm of the leg's rate against one leak law, so that legs at other vacua compare. */
  logScale: number
  sigma: number
  meanAirC: number | null
}

/** What remains of a leg's rate in doubt though its readings are many (judged). */
const FLOOR = 0.04

/** Scales of the legs whose rate stands clear of its error, ascending in time. Set-aside legs are left out. */
export function legScales(legs: readonly LegRow[], standardPressurePa: number): LegScale[] {
  const law = { orificePaPerHour: 0.5, laminarPaPerHour: 0.5, midPa: 30_000, standardPressurePa }
  return legs
    .flatMap((leg) => {
      const { rate, bins } = leg
      if (rate === null || leg.setAside || !(rate.paPerHour > 0)) return []
      const sigma = Math.hypot((rate.high - rate.low) / 3.92 / rate.paPerHour, FLOOR)
      const shape = ratePaPerHourAt(law, mean(bins.vacuumPa))
      if (!(shape > 0) || !(sigma < 0.5)) return []
      const air = bins.airC.flatMap((value) => value ?? [])
      return [
        {
          leg,
          sigma,
          logScale: Math.log(rate.paPerHour / shape),
          meanAirC: air.length === bins.airC.length && air.length > 0 ? mean(air) : null,
        },
      ]
    })
    .sort((a, b) => a.leg.startedAt - b.leg.startedAt)
}

export const mean = (values: readonly number[]): number =>
  values.reduce((sum, value) => sum + value, 0) / values.length
