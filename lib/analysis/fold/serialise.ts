import { initialState } from './initial-state'
import type { FoldState } from './state'

/** Plain data with every object's keys in alphabetical order, so that equal states have equal text. */
function ordered(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(ordered)
  if (value === null || typeof value !== 'object') return value
  const entries = Object.entries(value).sort(([a], [b]) => (a < b ? -1 : 1))
  return Object.fromEntries(entries.map(([key, inner]) => [key, ordered(inner)]))
}

/**
 * The state as canonical JSON, at most 8 kB: two states are equal when their texts are, whatever order a
 * database keeps keys in. Numbers keep all their digits, so a parsed state continues identically.
 */
export function serialiseState(state: FoldState): string {
  return JSON.stringify(ordered(state))
}

/**
 * A state from its text, as written by `serialiseState` of the same `DERIVER_VERSION` (a stored document
 * whose keys were reordered is fine: pass `JSON.stringify` of it).
 * @throws SyntaxError where it is not JSON, TypeError where it is not a state
 */
export function parseState(text: string): FoldState {
  const parsed: unknown = JSON.parse(text)
  if (!isStateLike(parsed)) throw new TypeError('not a state of the fold')
  return Object.assign(initialState(), parsed)
}

// The text is the program's own and carries its version: its presence and shape at the top are what is checked.
function isStateLike(value: unknown): value is FoldState {
  return (
    typeof value === 'object' &&
    value !== null &&
    'deriverVersion' in value &&
    'rings' in value &&
    'channels' in value
  )
}
