import { STRIP_MINUTES } from '@/components/charts/scales'
import type { Night } from '@/shared/schemas'

/**
 * The nights that are over, newest last, at most `most`: one that is still to come, or under way, must not be
 * read as quiet. A night is over when its quiet hours are, by the boat's own clock.
 */
export function finishedNights(
  nights: readonly Night[],
  offsetSeconds: number,
  nowMs: number,
  most = 7,
): Night[] {
  const localMs = nowMs + offsetSeconds * 1000
  return nights
    .filter((night) => Date.parse(`${night.date}T18:00:00Z`) + night.quiet[1] * 60_000 <= localMs)
    .slice(-most)
}

/**
 * A night whose list of runs was cut short, drawn on: the runs beyond it follow at the pace of those listed, to
 * the morning. `cut` says that this was done, so that its count is said as "about".
 */
export function drawnOn<N extends Night>(night: N): N & { cut: boolean } {
  const first = night.runs[0]
  const last = night.runs[night.runs.length - 1]
  if (night.more === 0 || first === undefined || last === undefined || night.runs.length < 2)
    return { ...night, cut: night.more > 0 }
  const pace = (last - first) / (night.runs.length - 1)
  const beyond = Array.from({ length: night.more }, (_, index) => last + pace * (index + 1))
  return {
    ...night,
    runs: [...night.runs, ...beyond.filter((minute) => minute <= STRIP_MINUTES)],
    more: 0,
    cut: true,
  }
}

/**
 * A night with the part in which nothing was heard: after the logger's last word, if that came before the quiet
 * hours were over. Such a night is neither quiet nor not.
 */
export function withSilence<N extends Night>(
  night: N,
  lastHeardAt: string | null,
  offsetSeconds: number,
): N & { unheardFrom?: number } {
  const sixOClockMs = Date.parse(`${night.date}T18:00:00Z`)
  const minute =
    lastHeardAt === null ? 0 : (Date.parse(lastHeardAt) + offsetSeconds * 1000 - sixOClockMs) / 60_000
  return minute < night.quiet[1] ? { ...night, unheardFrom: Math.max(0, Math.round(minute)) } : night
}
