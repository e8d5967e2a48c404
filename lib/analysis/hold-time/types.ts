import type { HoldRow, Instant, LegRow, OpenRows, RunRow } from '../fold/types'
import type { LeakModel } from '../fit'

export interface HoldTimeInput {
  at: Instant
  runs: readonly RunRow[]
  holds: readonly HoldRow[]
  legs: readonly LegRow[]
  open: OpenRows
  /** Learned points of the switch, the set-up's figures where nothing is learned yet; null = not known. */
  cutOutPa: number | null
  settledPa: number | null
  cutInPa: number | null
  /** Relative doubt of cut-out − cut-in where neither switch nor set-up told it (0 = known). */
  bandDoubt: number
  /** The place's standard pressure, Pa. */
  standardPressurePa: number
  /** On-demand systems have no standing vacuum: no hold time. */
  standingVacuum: boolean
}

/** What a hold time rests on: legs by the physical fit, whole short holds, or how long the pump stayed off. */
export type HoldTimeMethod = 'legs' | 'short-holds' | 'run-lengths'

export interface HoldTimeEstimate {
  method: HoldTimeMethod
  /** From cut-out to cut-in at steady 20 °C and standard pressure (`run-lengths`: as observed), s. */
  seconds: number
  low: number
  /** Null with a bound. */
  high: number | null
  bound: null | 'at-least'
  /** Holds that stand behind it. */
  holds: number
  /** Mean rate over the band, Pa/h; null where nothing measures vacuum. `high` is never null with a rate. */
  rate: { paPerHour: number; low: number; high: number } | null
  legs: number
  legsSetAside: number
  hours: number
  compensated: boolean
  model: LeakModel
}
