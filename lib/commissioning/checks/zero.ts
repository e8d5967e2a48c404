import { inHgToPa } from '@/shared/units'
import { middle, spread, vacuumSince } from './readings'
import type { Judged, Reading } from './types'

/** Common practice, no source: further from nought than this a sensor is set aside, not corrected. */
export const ZERO_LIMIT_PA = inHgToPa(0.3)
/** Common practice, no source: a sensor open to the air stands this still. */
export const ZERO_SPREAD_PA = inHgToPa(0.05)
const READINGS_NEEDED = 3

/**
 * Open to the air a sensor reads nought: how far is it off, and does it stand still?
 * What it is off by, within the limit, is taken off by the two-point check.
 * @param readings as read, not corrected; those since `beganMs` count, the first of them apart, since it may have
 *   been taken while the port was being opened
 * @example judgeZero(readingsOf([40, 38, 41, 39]), 0).outcome // 'passed'
 */
export function judgeZero(readings: readonly Reading[], beganMs: number): Judged {
  const values = vacuumSince(readings, beganMs).slice(1)
  const zeroPa = values.length === 0 ? null : middle(values)
  const figures: Judged['figures'] = [
    { name: 'Reads when open', value: zeroPa, unit: 'Pa' },
    { name: 'Moves by', value: values.length === 0 ? null : spread(values), unit: 'Pa' },
    { name: 'Readings', value: values.length, unit: 'count' },
  ]
  if (zeroPa === null || values.length < READINGS_NEEDED)
    return {
      outcome: 'cannot-tell',
      figures,
      reason: `It takes ${READINGS_NEEDED} readings with the port open; leave it open and wait for them.`,
    }
  if (spread(values) > ZERO_SPREAD_PA)
    return {
      outcome: 'failed',
      figures,
      reason:
        'It does not stand still. Take the hose right off the port, keep it out of the wind of a blower, and begin again; if it still moves, change the sensor.',
    }
  if (Math.abs(zeroPa) > ZERO_LIMIT_PA)
    return {
      outcome: 'failed',
      figures,
      reason:
        'It does not read nought in open air. Check that the port is open and dry and not under a cap, and begin again; if it stays, change the sensor.',
    }
  return {
    outcome: 'passed',
    figures,
    reason: 'Open to the air it reads nought, as near as it is corrected for.',
  }
}
