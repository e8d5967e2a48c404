/**
 * Regula falsi (Illinois) for the duration at which `past` turns positive, to half a millisecond, from the far
 * side: the result has passed the threshold.
 *
 * @param attempt what the state would be after so many seconds.
 * @param pastAtStart `past` at duration 0, negative. @param passed an attempt for which `past` is positive.
 */
export function crossing<Attempt extends { duration: number; vacuum: number }>(
  attempt: (duration: number) => Attempt,
  past: (vacuum: number) => number,
  pastAtStart: number,
  passed: Attempt,
): Attempt {
  let low = 0
  let lowValue = pastAtStart
  let high = passed
  let highValue = past(passed.vacuum)
  for (let i = 0; i < 40 && high.duration - low > 0.0005 && highValue > 0.001; i++) {
    const guess = (low * highValue - high.duration * lowValue) / (highValue - lowValue)
    const tried = attempt(Math.min(high.duration - 1e-6, Math.max(low + 1e-6, guess)))
    const value = past(tried.vacuum)
    if (value >= 0) {
      high = tried
      highValue = value
      lowValue /= 2
    } else {
      low = tried.duration
      lowValue = value
      highValue /= 2
    }
  }
  return high
}
