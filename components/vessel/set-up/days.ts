import { offsetAt, type ZoneOffset } from '@/components/time'

export type Offsets = readonly ZoneOffset[]

/**
 * The instant at which a calendar day begins on board; offsets are data, the browser's zone is never asked.
 * `startOfDay('2026-07-01', [{ from: 0, seconds: 3600 }]) // "2026-06-30T23:00:00.000Z"`
 */
export function startOfDay(date: string, offsets: Offsets): string {
  const wallMs = Date.parse(`${date}T00:00:00Z`)
  const guess = wallMs - offsetAt(offsets, wallMs) * 1000
  return new Date(wallMs - offsetAt(offsets, guess) * 1000).toISOString()
}

/** The calendar day on board at an instant, as a date field has it. */
export const dayOnBoard = (atMs: number, offsetSeconds: number): string =>
  new Date(atMs + offsetSeconds * 1000).toISOString().slice(0, 10)
