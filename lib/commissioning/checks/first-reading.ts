import type { Channel } from '@/shared/schemas'
import type { Judged } from './types'

/** Contract of uploads: a clock further off than this has its sample times shifted. */
const CLOCK_LIMIT_SECONDS = 120

const WORDS: Record<Channel, string> = {
  pump: 'the pump',
  vacuum: 'the vacuum',
  air: 'the air temperature',
  barometer: 'the barometer',
  supply: 'the supply voltage',
}
const TRY: Record<Channel, string> = {
  pump: 'check the lead on the pump’s side of its switch',
  vacuum: 'check the sensor’s plug and that it is the right way round',
  air: 'check the air probe’s plug',
  barometer: 'the barometer sits in the logger: send it back if a restart does not bring it',
  supply: 'check the supply lead’s fuse',
}

/**
 * Has the logger been heard, with each channel that it is meant to measure, and is its clock near enough?
 * @param asked.samples how many were stored since it was fitted
 * @example judgeFirstReading({ channels: ['pump'], seen: ['pump'], samples: 1, clockOffsetSeconds: 3 }).outcome // 'passed'
 */
export function judgeFirstReading(asked: {
  channels: readonly Channel[]
  seen: readonly Channel[]
  samples: number
  clockOffsetSeconds: number | null
}): Judged {
  const { channels, seen, samples, clockOffsetSeconds } = asked
  const figures: Judged['figures'] = [
    { name: 'Samples received', value: samples, unit: 'count' },
    { name: 'Clock ahead by', value: clockOffsetSeconds, unit: 's' },
  ]
  if (samples === 0)
    return {
      outcome: 'cannot-tell',
      figures,
      reason:
        'Nothing has arrived yet. Check that the logger is powered, that it has a signal here with the hatch closed, and that it holds the key.',
    }
  const missing = channels.filter((channel) => !seen.includes(channel))
  if (missing.length > 0)
    return {
      outcome: 'failed',
      figures,
      reason: `Heard, but without ${missing.map((channel) => WORDS[channel]).join(' and ')}: ${missing.map((channel) => TRY[channel]).join('; ')}.`,
    }
  if (clockOffsetSeconds !== null && Math.abs(clockOffsetSeconds) > CLOCK_LIMIT_SECONDS)
    return {
      outcome: 'failed',
      figures,
      reason:
        'Heard, but its clock is over two minutes off. Restart it where it has a signal, so that it fetches the time; a coin cell that is empty loses it again.',
    }
  return {
    outcome: 'passed',
    figures,
    reason:
      clockOffsetSeconds === null
        ? 'Heard with every channel; it does not tell what its clock says.'
        : 'Heard with every channel, and its clock is right.',
  }
}
