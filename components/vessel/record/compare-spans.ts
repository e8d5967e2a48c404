import { withQuery } from '@/components/data/request'
import type { Visit } from '@/shared/schemas'

/** One side as it is typed: the boat's wall clock, `2026-12-01T14:00`; empty = not given. */
export interface TypedSpan {
  from: string
  to: string
}
export interface Asked {
  before: TypedSpan
  after: TypedSpan
  /** A visit stands in for both sides. */
  visitId: string | null
}

export const NOTHING: TypedSpan = { from: '', to: '' }

/** `wallOf(0, 3600) // "1970-01-01T01:00"` */
export const wallOf = (ms: number, offsetSeconds: number): string =>
  new Date(ms + offsetSeconds * 1000).toISOString().slice(0, 16)

/** `instantOf('1970-01-01T01:00', 3600) // 0`; NaN for what is no time. */
export const instantOf = (wall: string, offsetSeconds: number): number =>
  Date.parse(`${wall}:00Z`) - offsetSeconds * 1000

/** What is wrong with a side, or null. */
export function spanTrouble(span: TypedSpan, offsetSeconds: number): string | null {
  const [from, to] = [instantOf(span.from, offsetSeconds), instantOf(span.to, offsetSeconds)]
  if (Number.isNaN(from) || Number.isNaN(to)) return 'Give both ends.'
  return from < to ? null : 'The end must be later than the beginning.'
}

/** The address of a comparison, or null while there is nothing whole to ask. */
export function comparisonPath(systemId: string, asked: Asked, offsetSeconds: number): string | null {
  const path = `/api/systems/${systemId}/comparison`
  if (asked.visitId !== null) return withQuery(path, { visit: asked.visitId })
  if (spanTrouble(asked.before, offsetSeconds) ?? spanTrouble(asked.after, offsetSeconds)) return null
  const text = ({ from, to }: TypedSpan) =>
    [from, to].map((wall) => new Date(instantOf(wall, offsetSeconds)).toISOString()).join('/')
  return withQuery(path, { before: text(asked.before), after: text(asked.after) })
}

/** Visits to the system that began: each divides its record in two. Newest first. */
export const comparableVisits = (visits: readonly Visit[], systemId: string): Visit[] =>
  visits
    .filter((visit) => visit.startedAt !== null && (visit.systemId === null || visit.systemId === systemId))
    .sort((a, b) => Date.parse(b.startedAt ?? '') - Date.parse(a.startedAt ?? ''))
