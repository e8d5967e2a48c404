import type { State } from '@/shared/schemas'

export type SystemState = State

/** The ten states a system can be in, worst first: the order in which a shop wants to see them. */
export const STATES: readonly State[] = [
  'short-cycling',
  'running-on',
  'leaking',
  'weeping',
  'off',
  'unheard',
  'worked-on',
  'learning',
  'laid-up',
  'tight',
]

/** The trade's word for each state, as technicians and shops read it. */
export const STATE_WORDS: Record<SystemState, string> = {
  'short-cycling': 'Short cycling',
  'running-on': 'Running on',
  leaking: 'Leaking',
  weeping: 'Weeping',
  off: 'Off',
  unheard: 'Unheard',
  'worked-on': 'Being worked on',
  learning: 'Learning',
  'laid-up': 'Laid up',
  tight: 'Tight',
}

/** What each state means, in one line, for a legend and for screen readers. */
export const STATE_MEANINGS: Record<SystemState, string> = {
  'short-cycling': 'the pump runs by itself every few minutes',
  'running-on': 'the pump stays on and the vacuum does not rise',
  leaking: 'holds less than the limit',
  weeping: 'holds longer than the limit, less than the aim',
  off: 'no vacuum, and the pump is not starting',
  unheard: 'nothing heard from the logger for longer than usual',
  'worked-on': 'a technician is at work; notices are held',
  learning: 'not enough heard yet to say',
  'laid-up': 'out of use; notices are held',
  tight: 'holds at least as long as the aim',
}

export type Tone = 'attention' | 'buff-ink' | 'sound' | 'ink' | 'ink-2'

/** The one colour of each state. Never alone: the word and the shape say the same. */
export const STATE_TONES: Record<SystemState, Tone> = {
  'short-cycling': 'attention',
  'running-on': 'attention',
  leaking: 'attention',
  weeping: 'buff-ink',
  off: 'ink',
  unheard: 'ink-2',
  'worked-on': 'ink',
  learning: 'ink-2',
  'laid-up': 'ink',
  tight: 'sound',
}

/** A boat in one of these states has runs that matter; on any other a run by itself is drawn in plain ink. */
export const isTroubled = (state: SystemState): boolean =>
  STATE_TONES[state] === 'attention' || state === 'weeping'

/** The state a word from an address names, or undefined. `stateOf('tight') // "tight"` */
export const stateOf = (word: string): State | undefined => STATES.find((state) => state === word)
