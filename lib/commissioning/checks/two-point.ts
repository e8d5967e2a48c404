import { inHgToPa } from '@/shared/units'
import { middle, spread } from './readings'
import type { Judged, Reading } from './types'

/** Common practice, no source: nearer to nought the gauge's own error decides the gain. */
const LEAST_GAUGE_PA = inHgToPa(5)
/** Common practice, no source: a sensor further off than this is wrong, not in want of correction. */
const GAIN_LIMIT = 0.05
const STILL_PA = inHgToPa(0.1)
const BESIDE_SECONDS = 30

export interface TwoPointAsked {
  /** As read, not corrected, newest last. */
  readings: readonly Reading[]
  nowMs: number
  /** How old the newest may be, s: the logger's rhythm and a little. */
  freshSeconds: number
  /** What it read open to the air, Pa; null when that was not passed. */
  zeroPa: number | null
  /** The hand gauge now, Pa, and what it can be read to. */
  gaugePa: number
  resolutionPa: number
}

/** What is written of it when it passes: measured vacuum becomes (as read − offset) × gain. */
export interface Correction {
  vacuumOffsetPa: number
  vacuumGain: number
}

/**
 * The logger beside a hand gauge at cut-out, its nought known: offset and gain. Within what the gauge can be read
 * to the two agree, and the gain stays 1: a coarse gauge does not correct a fine sensor.
 * @example judgeTwoPoint({ … zeroPa: 50, gaugePa: 33_864, resolutionPa: 339 }) // reads 33 950: agrees, offset 50, gain 1
 */
export function judgeTwoPoint(asked: TwoPointAsked): Judged & { correction: Correction | null } {
  const { zeroPa, gaugePa, resolutionPa, nowMs, freshSeconds } = asked
  const within = (seconds: number) => asked.readings.filter(({ atMs }) => atMs > nowMs - seconds * 1000)
  // A fine rhythm gives a few readings to compare with; a coarse one the newest alone.
  const beside = within(BESIDE_SECONDS)
  const recent = beside.length > 0 ? beside : within(freshSeconds).slice(-1)
  const values = recent.flatMap(({ vacuumPa }) => (vacuumPa === null ? [] : [vacuumPa]))
  const readPa = values.length === 0 ? null : middle(values)
  const gain = readPa === null || zeroPa === null ? null : gaugePa / (readPa - zeroPa)
  const figures: Judged['figures'] = [
    { name: 'Hand gauge', value: gaugePa, unit: 'Pa' },
    { name: 'Logger, as read', value: readPa, unit: 'Pa' },
    { name: 'Nought', value: zeroPa, unit: 'Pa' },
    { name: 'Gauge over logger', value: gain, unit: 'ratio' },
  ]
  const refuse = (outcome: 'failed' | 'cannot-tell', reason: string) => ({
    outcome,
    figures,
    reason,
    correction: null,
  })
  if (zeroPa === null || gain === null || readPa === null)
    return refuse(
      'cannot-tell',
      zeroPa === null
        ? 'The nought comes first: do the zero check, then this one.'
        : 'No reading has come in lately. Wait for the next, and read the gauge then.',
    )
  if (recent.some(({ pumpOn }) => pumpOn === true) || spread(values) > STILL_PA)
    return refuse(
      'cannot-tell',
      'The vacuum was moving. Let the pump stop, wait a minute, and read the gauge while nobody flushes.',
    )
  if (gaugePa < LEAST_GAUGE_PA)
    return refuse(
      'cannot-tell',
      'That is too near nought for a second point. Let the pump draw down to its cut-out, then read the gauge.',
    )
  if (!Number.isFinite(gain) || gain <= 0 || readPa - zeroPa < LEAST_GAUGE_PA / 2)
    return refuse(
      'failed',
      'The gauge shows vacuum and the logger does not. Open the sensor’s cock, look for a kinked or blocked hose at the tee, and check that gauge and logger are on the same tank.',
    )
  const differencePa = gaugePa - (readPa - zeroPa)
  const agrees = Math.abs(differencePa) <= resolutionPa
  if (!agrees && Math.abs(gain - 1) > GAIN_LIMIT)
    return refuse(
      'failed',
      'Gauge and logger are over a twentieth apart. Check the gauge at nought, tap it, and try another gauge; if the two gauges agree, change the sensor.',
    )
  return {
    outcome: 'passed',
    figures: [...figures, { name: 'Gain set', value: agrees ? 1 : gain, unit: 'ratio' }],
    reason: agrees
      ? 'Gauge and logger agree within what the gauge can be read to; the nought is taken off.'
      : 'The logger is corrected to the gauge from here on.',
    correction: { vacuumOffsetPa: zeroPa, vacuumGain: agrees ? 1 : gain },
  }
}
