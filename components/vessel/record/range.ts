import type { Span } from '@/components/charts/plot-options'

const SECOND = 1000
const HOUR = 3_600_000
const DAY = 24 * HOUR
export const SHORTEST_MS = SECOND
export const LONGEST_MS = 400 * DAY

/** The stretches that one press shows, up to now. */
export const STRETCHES: readonly { label: string; ms: number }[] = [
  { label: '1 h', ms: HOUR },
  { label: '6 h', ms: 6 * HOUR },
  { label: '2 days', ms: 2 * DAY },
  { label: '14 days', ms: 14 * DAY },
  { label: '60 days', ms: 60 * DAY },
  { label: 'Year', ms: 365 * DAY },
]
export const USUAL_MS = 2 * DAY

/** Holds a stretch to between a second and 400 days, and its end to at most a little past now. */
export function heldTo(range: Span, nowMs: number): Span {
  const length = Math.min(LONGEST_MS, Math.max(SHORTEST_MS, range.toMs - range.fromMs))
  const middle = (range.fromMs + range.toMs) / 2
  const latest = nowMs + length * 0.02
  const toMs = Math.min(latest, middle + length / 2)
  return { fromMs: Math.round(toMs - length), toMs: Math.round(toMs) }
}

/** Zooms by a factor (under 1 comes closer) about a place between 0 (left) and 1 (right). */
export function zoomed(range: Span, factor: number, about: number, nowMs: number): Span {
  const length = range.toMs - range.fromMs
  const pivot = range.fromMs + length * about
  const next = Math.min(LONGEST_MS, Math.max(SHORTEST_MS, length * factor))
  return heldTo({ fromMs: pivot - next * about, toMs: pivot + next * (1 - about) }, nowMs)
}

/** Moves by a share of the stretch, later when positive. */
export function panned(range: Span, share: number, nowMs: number): Span {
  const move = (range.toMs - range.fromMs) * share
  return heldTo({ fromMs: range.fromMs + move, toMs: range.toMs + move }, nowMs)
}

/** A stretch from an address's query, or null: both ends as RFC 3339, the earlier first. */
export function parseRange(query: URLSearchParams): Span | null {
  const fromMs = Date.parse(query.get('from') ?? '')
  const toMs = Date.parse(query.get('to') ?? '')
  return fromMs < toMs ? { fromMs, toMs } : null
}

/** What a key does to the stretch; undefined when it is not one of ours, null goes back to the usual one. */
export function byKey(key: string, range: Span, nowMs: number): Span | null | undefined {
  switch (key) {
    case '+':
    case '=':
      return zoomed(range, 0.5, 0.5, nowMs)
    case '-':
      return zoomed(range, 2, 0.5, nowMs)
    case 'ArrowLeft':
      return panned(range, -0.25, nowMs)
    case 'ArrowRight':
      return panned(range, 0.25, nowMs)
    case 'Home':
      return null
    default:
      return undefined
  }
}
