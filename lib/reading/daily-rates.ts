import type { DailyRate } from '@/lib/analysis/trend'

const DAY_MS = 86_400_000

/** Days of which legs say nothing, told by their short holds: the middle of those of the day. */
export function withShortHolds(
  byLegs: readonly DailyRate[],
  short: readonly { startedAt: number; paPerHour: number }[],
): DailyRate[] {
  const known = new Set(byLegs.map((day) => Math.floor(day.at / DAY_MS)))
  const rest = new Map<number, number[]>()
  for (const hold of short) {
    const day = Math.floor(hold.startedAt / DAY_MS)
    if (!known.has(day)) rest.set(day, [...(rest.get(day) ?? []), hold.paPerHour])
  }
  const told = [...rest].map(([day, rates]) => ({ at: (day + 0.5) * DAY_MS, paPerHour: middleOf(rates) }))
  return [...byLegs, ...told].sort((a, b) => a.at - b.at)
}

function middleOf(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b)
  return sorted[Math.floor((sorted.length - 1) / 2)] ?? 0
}
