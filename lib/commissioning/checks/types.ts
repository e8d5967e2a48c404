import type { CheckFigure, CheckOutcome } from '@/shared/schemas'

/** One sample of the logger being fitted: vacuum in Pa below ambient, epoch milliseconds. */
export interface Reading {
  atMs: number
  vacuumPa: number | null
  pumpOn: boolean | null
}

/** A run seen while a check was under way; vacuum in Pa. */
export interface SeenRun {
  startedAtMs: number
  stoppedAtMs: number | null
  trigger: 'leak' | 'flush' | 'startup' | 'unknown'
  vacuumAtStartPa: number | null
  vacuumAtStopPa: number | null
}

/** What a check came to: the figures it rests on, and in words what was found and what to try. */
export interface Judged {
  outcome: Exclude<CheckOutcome, 'left-out'>
  figures: CheckFigure[]
  reason: string
}

export type { CheckFigure }
