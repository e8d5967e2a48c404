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
