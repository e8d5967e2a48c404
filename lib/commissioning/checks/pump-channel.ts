import { inHgToPa } from '@/shared/units'
import type { Judged, Reading, SeenRun } from './types'

const RISE_PA = inHgToPa(0.3)

/**
 * One flush: the pump must be seen to start and to stop, and the vacuum to rise while it was on.
 * @param runs those that began after the step did
 * @example judgePumpChannel([], readings, { hasVacuum: true }).outcome // 'cannot-tell': nothing ran yet
 */
export function judgePumpChannel(
  runs: readonly SeenRun[],
  readings: readonly Reading[],
  { hasVacuum }: { hasVacuum: boolean },
): Judged {
  const whole = runs.find(({ stoppedAtMs }) => stoppedAtMs !== null)
  const stopped = whole?.stoppedAtMs ?? null
  const risePa =
    whole === undefined || whole.vacuumAtStopPa === null || whole.vacuumAtStartPa === null
      ? null
      : whole.vacuumAtStopPa - whole.vacuumAtStartPa
  const figures: Judged['figures'] = [
    { name: 'Runs seen', value: runs.length, unit: 'count' },
    {
      name: 'The run took',
      value: whole === undefined || stopped === null ? null : (stopped - whole.startedAtMs) / 1000,
      unit: 's',
    },
    { name: 'Vacuum rose by', value: risePa, unit: 'Pa' },
  ]
  if (whole === undefined) {
    if (runs.length > 0)
      return {
        outcome: 'cannot-tell',
        figures,
        reason: 'The pump has started and has not been seen to stop. Wait until it does.',
      }
    const states = readings.flatMap(({ pumpOn }) => (pumpOn === null ? [] : [pumpOn]))
    if (states.length >= 3 && states.every((on) => on))
      return {
        outcome: 'failed',
        figures,
        reason:
          'The pump reads as on all the while. If you hear it stand still, its signal is taken before the switch or is inverted: take it from the pump’s side of the switch.',
      }
    return {
      outcome: 'cannot-tell',
      figures,
      reason:
        'No run has been seen yet. Flush one bowl and wait until the pump has stopped. If you heard it run, check the pump lead: it belongs on the pump’s side of the switch.',
    }
  }
  if (hasVacuum && risePa !== null && risePa < -RISE_PA)
    return {
      outcome: 'failed',
      figures,
      reason: 'The vacuum fell while the pump read as on: its signal is inverted. Swap it, and flush again.',
    }
  if (hasVacuum && (risePa === null || risePa < RISE_PA))
    return {
      outcome: 'failed',
      figures,
      reason:
        'A run was seen, but the vacuum did not rise with it. Check that pump lead and sensor belong to the same system, and flush once more.',
    }
  return { outcome: 'passed', figures, reason: 'Start and stop were both seen.' }
}
