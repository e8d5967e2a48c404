import type { SystemState } from './types'

/** Worst first; states that people chose come last, those that nothing is known of before the sound ones. */
const ORDER: Record<SystemState, number> = {
  'running-on': 0,
  'short-cycling': 1,
  leaking: 2,
  weeping: 3,
  unheard: 4,
  off: 5,
  learning: 6,
  tight: 7,
  'worked-on': 8,
  'laid-up': 9,
}

/** A number that orders a fleet: by state, then by the shorter hold. */
export function rankOf(state: SystemState, holdSeconds: number | null): number {
  const hours = holdSeconds === null ? 999 : Math.min(998, holdSeconds / 3600)
  return ORDER[state] * 1000 + hours
}
